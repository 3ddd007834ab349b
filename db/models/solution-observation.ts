import { DataTypes, Model } from 'sequelize';
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { Solution } from './solution';
import { MeasurementSet } from './measurement-set';
import { Frame } from './frame';
import { StandardStar } from './standard-star';
import { Person } from './person';

/** Every observation that a fit saw: its residual, its weight and, if it was left out, why. */
export class SolutionObservation extends Model<
  InferAttributes<SolutionObservation>,
  InferCreationAttributes<SolutionObservation>
> {
  declare solutionId: number;
  declare seq: number;
  declare setId: number;
  declare rowNo: number;
  declare frameId: number;
  declare standardId: number;
  declare band: string;
  declare airmass: number;
  declare colour: number | null;
  /** published, in the band */
  declare magnitude: number | null;
  declare hours: number;
  declare instMag: number;
  declare instErr: number;
  declare residual: number | null;
  declare standardised: number | null;
  declare weight: number | null;
  declare leverage: number | null;
  /** Cook's distance */
  declare influence: number | null;
  declare isUsed: boolean;
  declare reason: CreationOptional<string>;
  /** null: the fit; otherwise the person */
  declare decidedById: number | null;

  static associate(): void {
    SolutionObservation.belongsTo(Solution, { as: 'solution', foreignKey: 'solutionId' });
    SolutionObservation.belongsTo(MeasurementSet, { as: 'set', foreignKey: 'setId' });
    SolutionObservation.belongsTo(Frame, { as: 'frame', foreignKey: 'frameId' });
    SolutionObservation.belongsTo(StandardStar, { as: 'standard', foreignKey: 'standardId' });
    SolutionObservation.belongsTo(Person, { as: 'decidedBy', foreignKey: 'decidedById' });
  }

  static define(sequelize: Sequelize): void {
    SolutionObservation.init(
      {
        solutionId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, allowNull: false },
        seq: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, allowNull: false },
        setId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        rowNo: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        frameId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        standardId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        band: { type: DataTypes.CHAR(1), allowNull: false },
        airmass: { type: DataTypes.DOUBLE, allowNull: false },
        colour: { type: DataTypes.DOUBLE, allowNull: true },
        magnitude: { type: DataTypes.DOUBLE, allowNull: true },
        hours: { type: DataTypes.DOUBLE, allowNull: false },
        instMag: { type: DataTypes.DOUBLE, allowNull: false },
        instErr: { type: DataTypes.DOUBLE, allowNull: false },
        residual: { type: DataTypes.DOUBLE, allowNull: true },
        standardised: { type: DataTypes.DOUBLE, allowNull: true },
        weight: { type: DataTypes.DOUBLE, allowNull: true },
        leverage: { type: DataTypes.DOUBLE, allowNull: true },
        influence: { type: DataTypes.DOUBLE, allowNull: true },
        isUsed: { type: DataTypes.BOOLEAN, allowNull: false },
        reason: { type: DataTypes.STRING(500), allowNull: false, defaultValue: '' },
        decidedById: { type: DataTypes.INTEGER.UNSIGNED, allowNull: true },
      },
      { sequelize, modelName: 'SolutionObservation', tableName: 'solution_observations' },
    );
  }
}
