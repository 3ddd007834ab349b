import { DataTypes, Model, literal } from 'sequelize';
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { Night } from './night';
import { Person } from './person';

/** The sky as somebody, or a sensor, saw it. */
export class Condition extends Model<InferAttributes<Condition>, InferCreationAttributes<Condition>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare nightId: number;
  declare utc: Date;
  /** eighths */
  declare cloud: number | null;
  /** arcsec */
  declare seeing: number | null;
  /** percent */
  declare humidity: number | null;
  /** m/s */
  declare wind: number | null;
  /** deg, where it blows from */
  declare windDirection: number | null;
  /** deg C */
  declare temperature: number | null;
  /** mag per square arcsec */
  declare skyBrightness: number | null;
  declare comment: CreationOptional<string>;
  declare recordedById: number;
  declare createdAt: CreationOptional<Date>;

  static associate(): void {
    Condition.belongsTo(Night, { as: 'night', foreignKey: 'nightId' });
    Condition.belongsTo(Person, { as: 'recordedBy', foreignKey: 'recordedById' });
  }

  static define(sequelize: Sequelize): void {
    Condition.init(
      {
        id: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, autoIncrement: true, allowNull: false },
        publicId: { type: DataTypes.CHAR(12), allowNull: false },
        nightId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        utc: { type: DataTypes.DATE(3), allowNull: false },
        cloud: { type: DataTypes.TINYINT.UNSIGNED, allowNull: true },
        seeing: { type: DataTypes.DOUBLE, allowNull: true },
        humidity: { type: DataTypes.DOUBLE, allowNull: true },
        wind: { type: DataTypes.DOUBLE, allowNull: true },
        windDirection: { type: DataTypes.SMALLINT.UNSIGNED, allowNull: true },
        temperature: { type: DataTypes.DOUBLE, allowNull: true },
        skyBrightness: { type: DataTypes.DOUBLE, allowNull: true },
        comment: { type: DataTypes.STRING(500), allowNull: false, defaultValue: '' },
        recordedById: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        createdAt: {
          type: DataTypes.DATE(3),
          allowNull: false,
          defaultValue: literal('CURRENT_TIMESTAMP(3)'),
        },
      },
      { sequelize, modelName: 'Condition', tableName: 'conditions' },
    );
  }
}
