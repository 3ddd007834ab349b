import { DataTypes, Model, literal } from 'sequelize';
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { Solution } from './solution';
import { Person } from './person';

/** What people said about a solution. */
export class SolutionComment extends Model<
  InferAttributes<SolutionComment>,
  InferCreationAttributes<SolutionComment>
> {
  declare id: CreationOptional<number>;
  declare solutionId: number;
  declare personId: number;
  declare act: string;
  declare text: string;
  declare createdAt: CreationOptional<Date>;

  static associate(): void {
    SolutionComment.belongsTo(Solution, { as: 'solution', foreignKey: 'solutionId' });
    SolutionComment.belongsTo(Person, { as: 'person', foreignKey: 'personId' });
  }

  static define(sequelize: Sequelize): void {
    SolutionComment.init(
      {
        id: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, autoIncrement: true, allowNull: false },
        solutionId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        personId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        act: { type: DataTypes.STRING(16), allowNull: false },
        text: { type: DataTypes.TEXT, allowNull: false },
        createdAt: {
          type: DataTypes.DATE(3),
          allowNull: false,
          defaultValue: literal('CURRENT_TIMESTAMP(3)'),
        },
      },
      { sequelize, modelName: 'SolutionComment', tableName: 'solution_comments' },
    );
  }
}
