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
  declare outcome: string;
  /** square, in the order of solution_coefficients.seq */
  declare covariance: object;
  /** likewise; null where a variance is zero */
  declare correlation: object;
  declare scatterObservation: number | null;
  declare scatterFrame: number | null;
  declare nUsed: number;
  declare nRejected: number;
  declare nStars: number;
  declare nFrames: number;
  declare dof: number | null;
  declare reducedChi2: number | null;
  declare conditionNumber: number | null;
  declare airmassMin: number | null;
  declare airmassMax: number | null;
  declare colourMin: number | null;
  declare colourMax: number | null;
  declare utcFirst: Date | null;
  declare utcLast: Date | null;
  /** mag */
  declare leaveOneStarOut: number | null;
  /** mag per hour, fitted beside */
  declare driftValue: number | null;
  declare driftError: number | null;
  /** standard normal deviate of the runs test */
  declare runs: number | null;
  declare crossChecks: object;
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
        outcome: { type: DataTypes.STRING(16), allowNull: false },
        covariance: { type: DataTypes.JSON, allowNull: false },
        correlation: { type: DataTypes.JSON, allowNull: false },
        scatterObservation: { type: DataTypes.DOUBLE, allowNull: true },
        scatterFrame: { type: DataTypes.DOUBLE, allowNull: true },
        nUsed: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        nRejected: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        nStars: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        nFrames: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        dof: { type: DataTypes.DOUBLE, allowNull: true },
        reducedChi2: { type: DataTypes.DOUBLE, allowNull: true },
        conditionNumber: { type: DataTypes.DOUBLE, allowNull: true },
        airmassMin: { type: DataTypes.DOUBLE, allowNull: true },
        airmassMax: { type: DataTypes.DOUBLE, allowNull: true },
        colourMin: { type: DataTypes.DOUBLE, allowNull: true },
        colourMax: { type: DataTypes.DOUBLE, allowNull: true },
        utcFirst: { type: DataTypes.DATE(3), allowNull: true },
        utcLast: { type: DataTypes.DATE(3), allowNull: true },
        leaveOneStarOut: { type: DataTypes.DOUBLE, allowNull: true },
        driftValue: { type: DataTypes.DOUBLE, allowNull: true },
        driftError: { type: DataTypes.DOUBLE, allowNull: true },
        runs: { type: DataTypes.DOUBLE, allowNull: true },
        crossChecks: { type: DataTypes.JSON, allowNull: false },
        warnings: { type: DataTypes.JSON, allowNull: false },
      },
      { sequelize, modelName: 'SolutionBand', tableName: 'solution_bands' },
    );
  }
}
