import { DataTypes, Model, literal } from 'sequelize';
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { Solution } from './solution';
import { MeasurementSet } from './measurement-set';
import { Person } from './person';

/** A person's decisions on observations, inputs of the fit. */
export class SolutionExclusion extends Model<
  InferAttributes<SolutionExclusion>,
  InferCreationAttributes<SolutionExclusion>
> {
  declare solutionId: number;
  declare setId: number;
  declare rowNo: number;
  /** false: kept in, whatever the fit thinks of it */
  declare isExcluded: boolean;
  declare reason: string;
  declare personId: number;
  declare createdAt: CreationOptional<Date>;

  static associate(): void {
    SolutionExclusion.belongsTo(Solution, { as: 'solution', foreignKey: 'solutionId' });
    SolutionExclusion.belongsTo(MeasurementSet, { as: 'set', foreignKey: 'setId' });
    SolutionExclusion.belongsTo(Person, { as: 'person', foreignKey: 'personId' });
  }

  static define(sequelize: Sequelize): void {
    SolutionExclusion.init(
      {
        solutionId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, allowNull: false },
        setId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, allowNull: false },
        rowNo: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, allowNull: false },
        isExcluded: { type: DataTypes.BOOLEAN, allowNull: false },
        reason: { type: DataTypes.STRING(500), allowNull: false },
        personId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        createdAt: {
          type: DataTypes.DATE(3),
          allowNull: false,
          defaultValue: literal('CURRENT_TIMESTAMP(3)'),
        },
      },
      { sequelize, modelName: 'SolutionExclusion', tableName: 'solution_exclusions' },
    );
  }
}
