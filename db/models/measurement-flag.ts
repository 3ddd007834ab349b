import { DataTypes, Model } from 'sequelize';
import type { InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { MeasurementSet } from './measurement-set';

/** The distinct flag texts of a set, so that rows carry a number. */
export class MeasurementFlag extends Model<
  InferAttributes<MeasurementFlag>,
  InferCreationAttributes<MeasurementFlag>
> {
  declare setId: number;
  declare flagNo: number;
  declare text: string;

  static associate(): void {
    MeasurementFlag.belongsTo(MeasurementSet, { as: 'set', foreignKey: 'setId' });
  }

  static define(sequelize: Sequelize): void {
    MeasurementFlag.init(
      {
        setId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, allowNull: false },
        flagNo: { type: DataTypes.SMALLINT.UNSIGNED, primaryKey: true, allowNull: false },
        text: { type: DataTypes.STRING(120), allowNull: false },
      },
      { sequelize, modelName: 'MeasurementFlag', tableName: 'measurement_flags' },
    );
  }
}
