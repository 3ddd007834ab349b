import { DataTypes, Model } from 'sequelize';
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { Site } from './site';

/** Telescopes, known to clients by their code. */
export class Telescope extends Model<InferAttributes<Telescope>, InferCreationAttributes<Telescope>> {
  declare id: CreationOptional<number>;
  declare siteId: number;
  declare code: string;
  declare name: string;
  declare apertureM: number;
  /** deg, lowest pointing */
  declare minAltitude: CreationOptional<number>;
  declare retiredOn: string | null;

  static associate(): void {
    Telescope.belongsTo(Site, { as: 'site', foreignKey: 'siteId' });
  }

  static define(sequelize: Sequelize): void {
    Telescope.init(
      {
        id: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, autoIncrement: true, allowNull: false },
        siteId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        code: { type: DataTypes.STRING(32), allowNull: false },
        name: { type: DataTypes.STRING(120), allowNull: false },
        apertureM: { type: DataTypes.DOUBLE, allowNull: false },
        minAltitude: { type: DataTypes.DOUBLE, allowNull: false, defaultValue: 15 },
        retiredOn: { type: DataTypes.DATEONLY, allowNull: true },
      },
      { sequelize, modelName: 'Telescope', tableName: 'telescopes' },
    );
  }
}
