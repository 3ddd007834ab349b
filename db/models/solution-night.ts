import { DataTypes, Model } from 'sequelize';
import type { InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { Solution } from './solution';
import { Night } from './night';

/** The nights that one solution joins. */
export class SolutionNight extends Model<
  InferAttributes<SolutionNight>,
  InferCreationAttributes<SolutionNight>
> {
  declare solutionId: number;
  declare nightId: number;

  static associate(): void {
    SolutionNight.belongsTo(Solution, { as: 'solution', foreignKey: 'solutionId' });
    SolutionNight.belongsTo(Night, { as: 'night', foreignKey: 'nightId' });
  }

  static define(sequelize: Sequelize): void {
    SolutionNight.init(
      {
        solutionId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, allowNull: false },
        nightId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, allowNull: false },
      },
      { sequelize, modelName: 'SolutionNight', tableName: 'solution_nights' },
    );
  }
}
