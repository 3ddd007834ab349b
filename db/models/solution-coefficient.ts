import { DataTypes, Model } from 'sequelize';
import type { InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { SolutionBand } from './solution-band';

/** Coefficients with their errors. */
export class SolutionCoefficient extends Model<
  InferAttributes<SolutionCoefficient>,
  InferCreationAttributes<SolutionCoefficient>
> {
  declare solutionBandId: number;
  declare seq: number;
  declare name: string;
  declare status: string;
  /** null where the observations cannot determine it */
  declare value: number | null;
  declare error: number | null;
  /** half width, by Student's t */
  declare interval95: number | null;
  declare varianceInflation: number | null;
  declare priorValue: number | null;
  declare priorError: number | null;

  static associate(): void {
    SolutionCoefficient.belongsTo(SolutionBand, { as: 'solutionBand', foreignKey: 'solutionBandId' });
  }

  static define(sequelize: Sequelize): void {
    SolutionCoefficient.init(
      {
        solutionBandId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, allowNull: false },
        seq: { type: DataTypes.TINYINT.UNSIGNED, primaryKey: true, allowNull: false },
        name: { type: DataTypes.STRING(24), allowNull: false },
        status: { type: DataTypes.STRING(8), allowNull: false },
        value: { type: DataTypes.DOUBLE, allowNull: true },
        error: { type: DataTypes.DOUBLE, allowNull: true },
        interval95: { type: DataTypes.DOUBLE, allowNull: true },
        varianceInflation: { type: DataTypes.DOUBLE, allowNull: true },
        priorValue: { type: DataTypes.DOUBLE, allowNull: true },
        priorError: { type: DataTypes.DOUBLE, allowNull: true },
      },
      { sequelize, modelName: 'SolutionCoefficient', tableName: 'solution_coefficients' },
    );
  }
}
