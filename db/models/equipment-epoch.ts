import { DataTypes, Model } from 'sequelize';
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { Telescope } from './telescope';
import { Camera } from './camera';

/** Spans in which mirror, camera and filters stayed the same, so that colour terms may be shared. */
export class EquipmentEpoch extends Model<
  InferAttributes<EquipmentEpoch>,
  InferCreationAttributes<EquipmentEpoch>
> {
  declare id: CreationOptional<number>;
  declare telescopeId: number;
  declare cameraId: number;
  declare startsOn: string;
  /** first date that no longer belongs to it */
  declare endsOn: string | null;
  declare description: string;
  /** per band: value and error, mag per mag; recorded terms that a solve may take as priors */
  declare colourTerms: object;

  static associate(): void {
    EquipmentEpoch.belongsTo(Telescope, { as: 'telescope', foreignKey: 'telescopeId' });
    EquipmentEpoch.belongsTo(Camera, { as: 'camera', foreignKey: 'cameraId' });
  }

  static define(sequelize: Sequelize): void {
    EquipmentEpoch.init(
      {
        id: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, autoIncrement: true, allowNull: false },
        telescopeId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        cameraId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        startsOn: { type: DataTypes.DATEONLY, allowNull: false },
        endsOn: { type: DataTypes.DATEONLY, allowNull: true },
        description: { type: DataTypes.STRING(500), allowNull: false },
        colourTerms: { type: DataTypes.JSON, allowNull: false },
      },
      { sequelize, modelName: 'EquipmentEpoch', tableName: 'equipment_epochs' },
    );
  }
}
