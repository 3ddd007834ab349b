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
  /** mean time of the night's standards; null until solved */
  declare utcZero: Date | null;

  static associate(): void {
    SolutionNight.belongsTo(Solution, { as: 'solution', foreignKey: 'solutionId' });
    SolutionNight.belongsTo(Night, { as: 'night', foreignKey: 'nightId' });
  }

  static define(sequelize: Sequelize): void {
    SolutionNight.init(
      {
        solutionId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, allowNull: false },
        nightId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, allowNull: false },
        utcZero: { type: DataTypes.DATE(3), allowNull: true },
      },
      { sequelize, modelName: 'SolutionNight', tableName: 'solution_nights' },
    );
  }
}
