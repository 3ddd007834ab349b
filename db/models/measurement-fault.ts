import { DataTypes, Model } from 'sequelize';
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { MeasurementSet } from './measurement-set';

/** What was wrong with a refused table: the first thousand, each with its place. */
export class MeasurementFault extends Model<
  InferAttributes<MeasurementFault>,
  InferCreationAttributes<MeasurementFault>
> {
  declare setId: number;
  declare seq: number;
  declare line: number | null;
  declare columnName: string | null;
  declare value: string | null;
  declare message: string;
  declare remedy: CreationOptional<string>;

  static associate(): void {
    MeasurementFault.belongsTo(MeasurementSet, { as: 'set', foreignKey: 'setId' });
  }

  static define(sequelize: Sequelize): void {
    MeasurementFault.init(
      {
        setId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, allowNull: false },
        seq: { type: DataTypes.SMALLINT.UNSIGNED, primaryKey: true, allowNull: false },
        line: { type: DataTypes.INTEGER.UNSIGNED, allowNull: true },
        columnName: { type: DataTypes.STRING(120), allowNull: true },
        value: { type: DataTypes.STRING(200), allowNull: true },
        message: { type: DataTypes.STRING(500), allowNull: false },
        remedy: { type: DataTypes.STRING(500), allowNull: false, defaultValue: '' },
      },
      { sequelize, modelName: 'MeasurementFault', tableName: 'measurement_faults' },
    );
  }
}
