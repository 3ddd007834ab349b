import { DataTypes, Model } from 'sequelize';
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { Solution } from './solution';
import { Night } from './night';

/** What a solution found for one band of one night. */
export class SolutionBand extends Model<
  InferAttributes<SolutionBand>,
  InferCreationAttributes<SolutionBand>
> {
  declare id: CreationOptional<number>;
  declare solutionId: number;
  declare nightId: number;
  declare band: string;
  declare colourIndex: string;
  /** square, in the order of solution_coefficients.seq */
  declare covariance: object;
  declare scatterObservation: number | null;
  declare scatterFrame: number | null;
  declare nUsed: number;
  declare nRejected: number;
  declare dof: number | null;
  declare reducedChi2: number | null;
  declare conditionNumber: number | null;
  declare airmassMin: number | null;
  declare airmassMax: number | null;
  declare colourMin: number | null;
  declare colourMax: number | null;
  declare utcFirst: Date | null;
  declare utcLast: Date | null;
  declare warnings: object;

  static associate(): void {
    SolutionBand.belongsTo(Solution, { as: 'solution', foreignKey: 'solutionId' });
    SolutionBand.belongsTo(Night, { as: 'night', foreignKey: 'nightId' });
  }

  static define(sequelize: Sequelize): void {
    SolutionBand.init(
      {
        id: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, autoIncrement: true, allowNull: false },
        solutionId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        nightId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        band: { type: DataTypes.CHAR(1), allowNull: false },
        colourIndex: { type: DataTypes.CHAR(2), allowNull: false },
        covariance: { type: DataTypes.JSON, allowNull: false },
        scatterObservation: { type: DataTypes.DOUBLE, allowNull: true },
        scatterFrame: { type: DataTypes.DOUBLE, allowNull: true },
        nUsed: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        nRejected: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        dof: { type: DataTypes.DOUBLE, allowNull: true },
        reducedChi2: { type: DataTypes.DOUBLE, allowNull: true },
        conditionNumber: { type: DataTypes.DOUBLE, allowNull: true },
        airmassMin: { type: DataTypes.DOUBLE, allowNull: true },
        airmassMax: { type: DataTypes.DOUBLE, allowNull: true },
        colourMin: { type: DataTypes.DOUBLE, allowNull: true },
        colourMax: { type: DataTypes.DOUBLE, allowNull: true },
        utcFirst: { type: DataTypes.DATE(3), allowNull: true },
        utcLast: { type: DataTypes.DATE(3), allowNull: true },
        warnings: { type: DataTypes.JSON, allowNull: false },
      },
      { sequelize, modelName: 'SolutionBand', tableName: 'solution_bands' },
    );
  }
}
