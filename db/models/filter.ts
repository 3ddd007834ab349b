import { DataTypes, Model } from 'sequelize';
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { Telescope } from './telescope';

/** Which bands a telescope observes in. */
export class Filter extends Model<InferAttributes<Filter>, InferCreationAttributes<Filter>> {
  declare id: CreationOptional<number>;
  declare telescopeId: number;
  declare band: string;
  declare name: string;
  /** s */
  declare defaultExposure: number | null;

  static associate(): void {
    Filter.belongsTo(Telescope, { as: 'telescope', foreignKey: 'telescopeId' });
  }

  static define(sequelize: Sequelize): void {
    Filter.init(
      {
        id: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, autoIncrement: true, allowNull: false },
        telescopeId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        band: { type: DataTypes.CHAR(1), allowNull: false },
        name: { type: DataTypes.STRING(120), allowNull: false },
        defaultExposure: { type: DataTypes.DOUBLE, allowNull: true },
      },
      { sequelize, modelName: 'Filter', tableName: 'filters' },
    );
  }
}
