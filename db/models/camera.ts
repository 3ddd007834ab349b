import { DataTypes, Model } from 'sequelize';
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { Telescope } from './telescope';

/** Detectors. */
export class Camera extends Model<InferAttributes<Camera>, InferCreationAttributes<Camera>> {
  declare id: CreationOptional<number>;
  declare telescopeId: number;
  declare name: string;
  declare widthPx: number;
  declare heightPx: number;
  /** arcsec per pixel */
  declare pixelScale: number;
  /** electrons per count */
  declare gain: number;
  /** electrons rms */
  declare readNoise: number;
  /** counts; a peak at or above it is flagged */
  declare saturation: number;

  static associate(): void {
    Camera.belongsTo(Telescope, { as: 'telescope', foreignKey: 'telescopeId' });
  }

  static define(sequelize: Sequelize): void {
    Camera.init(
      {
        id: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, autoIncrement: true, allowNull: false },
        telescopeId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        name: { type: DataTypes.STRING(120), allowNull: false },
        widthPx: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        heightPx: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        pixelScale: { type: DataTypes.DOUBLE, allowNull: false },
        gain: { type: DataTypes.DOUBLE, allowNull: false },
        readNoise: { type: DataTypes.DOUBLE, allowNull: false },
        saturation: { type: DataTypes.DOUBLE, allowNull: false },
      },
      { sequelize, modelName: 'Camera', tableName: 'cameras' },
    );
  }
}
