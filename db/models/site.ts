import { DataTypes, Model } from 'sequelize';
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { Observatory } from './observatory';

/** Places on Earth. */
export class Site extends Model<InferAttributes<Site>, InferCreationAttributes<Site>> {
  declare id: CreationOptional<number>;
  declare observatoryId: number;
  declare name: string;
  /** deg, east positive */
  declare longitude: number;
  /** deg, north positive */
  declare latitude: number;
  /** m above sea level */
  declare elevation: number;
  /** IANA name */
  declare timezone: string;
  /** per band: mean and sigma, mag per airmass, with its source */
  declare meanExtinction: object;

  static associate(): void {
    Site.belongsTo(Observatory, { as: 'observatory', foreignKey: 'observatoryId' });
  }

  static define(sequelize: Sequelize): void {
    Site.init(
      {
        id: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, autoIncrement: true, allowNull: false },
        observatoryId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        name: { type: DataTypes.STRING(120), allowNull: false },
        longitude: { type: DataTypes.DOUBLE, allowNull: false },
        latitude: { type: DataTypes.DOUBLE, allowNull: false },
        elevation: { type: DataTypes.DOUBLE, allowNull: false },
        timezone: { type: DataTypes.STRING(64), allowNull: false },
        meanExtinction: { type: DataTypes.JSON, allowNull: false },
      },
      { sequelize, modelName: 'Site', tableName: 'sites' },
    );
  }
}
