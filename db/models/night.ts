import { DataTypes, Model, literal } from 'sequelize';
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { Telescope } from './telescope';
import { Person } from './person';

/** One telescope, one local evening date. */
export class Night extends Model<InferAttributes<Night>, InferCreationAttributes<Night>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare telescopeId: number;
  /** local evening date */
  declare date: string;
  /** local noon, UTC */
  declare startsAt: Date;
  /** next local noon, UTC */
  declare endsAt: Date;
  declare state: CreationOptional<string>;
  declare summary: string;
  declare version: CreationOptional<number>;
  declare openedById: number;
  declare closedById: number | null;
  declare closedAt: Date | null;
  declare reopenedReason: string | null;
  declare createdAt: CreationOptional<Date>;

  static associate(): void {
    Night.belongsTo(Telescope, { as: 'telescope', foreignKey: 'telescopeId' });
    Night.belongsTo(Person, { as: 'openedBy', foreignKey: 'openedById' });
    Night.belongsTo(Person, { as: 'closedBy', foreignKey: 'closedById' });
  }

  static define(sequelize: Sequelize): void {
    Night.init(
      {
        id: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, autoIncrement: true, allowNull: false },
        publicId: { type: DataTypes.CHAR(12), allowNull: false },
        telescopeId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        date: { type: DataTypes.DATEONLY, allowNull: false },
        startsAt: { type: DataTypes.DATE(3), allowNull: false },
        endsAt: { type: DataTypes.DATE(3), allowNull: false },
        state: { type: DataTypes.STRING(16), allowNull: false, defaultValue: 'open' },
        summary: { type: DataTypes.TEXT, allowNull: false },
        version: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 1 },
        openedById: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        closedById: { type: DataTypes.INTEGER.UNSIGNED, allowNull: true },
        closedAt: { type: DataTypes.DATE(3), allowNull: true },
        reopenedReason: { type: DataTypes.STRING(500), allowNull: true },
        createdAt: {
          type: DataTypes.DATE(3),
          allowNull: false,
          defaultValue: literal('CURRENT_TIMESTAMP(3)'),
        },
      },
      { sequelize, modelName: 'Night', tableName: 'nights' },
    );
  }
}
