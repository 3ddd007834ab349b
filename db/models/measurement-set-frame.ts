import { DataTypes, Model } from 'sequelize';
import type { InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { Frame } from './frame';
import { MeasurementSet } from './measurement-set';

/** Which frames a set has measurements on. */
export class MeasurementSetFrame extends Model<
  InferAttributes<MeasurementSetFrame>,
  InferCreationAttributes<MeasurementSetFrame>
> {
  declare setId: number;
  declare frameId: number;
  declare nRows: number;

  static associate(): void {
    MeasurementSetFrame.belongsTo(MeasurementSet, { as: 'set', foreignKey: 'setId' });
    MeasurementSetFrame.belongsTo(Frame, { as: 'frame', foreignKey: 'frameId' });
  }

  static define(sequelize: Sequelize): void {
    MeasurementSetFrame.init(
      {
        setId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, allowNull: false },
        frameId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, allowNull: false },
        nRows: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
      },
      { sequelize, modelName: 'MeasurementSetFrame', tableName: 'measurement_set_frames' },
    );
  }
}
