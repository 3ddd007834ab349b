import { DataTypes, Model, literal } from 'sequelize';
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { Night } from './night';
import { Programme } from './programme';
import { Person } from './person';

/** One exposure each, with its geometry at mid-exposure. */
export class Frame extends Model<InferAttributes<Frame>, InferCreationAttributes<Frame>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare nightId: number;
  declare number: number;
  declare type: string;
  declare file: string | null;
  declare object: CreationOptional<string>;
  /** standard field */
  declare field: string | null;
  declare programmeId: number | null;
  /** deg J2000 */
  declare ra: number | null;
  /** deg J2000 */
  declare decl: number | null;
  declare band: string | null;
  declare utcStart: Date;
  /** s */
  declare exposure: number;
  declare utcMid: Date;
  declare airmass: number | null;
  /** deg, true, at mid-exposure */
  declare altitude: number | null;
  /** hours, west positive, at mid-exposure */
  declare hourAngle: number | null;
  /** deg */
  declare moonSeparation: number | null;
  /** deg */
  declare sunAltitude: number;
  /** arcsec */
  declare fwhm: number | null;
  /** mag per square arcsec */
  declare sky: number | null;
  declare comment: CreationOptional<string>;
  declare origin: string;
  declare version: CreationOptional<number>;
  declare loggedById: number;
  declare createdAt: CreationOptional<Date>;

  static associate(): void {
    Frame.belongsTo(Night, { as: 'night', foreignKey: 'nightId' });
    Frame.belongsTo(Programme, { as: 'programme', foreignKey: 'programmeId' });
    Frame.belongsTo(Person, { as: 'loggedBy', foreignKey: 'loggedById' });
  }

  static define(sequelize: Sequelize): void {
    Frame.init(
      {
        id: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, autoIncrement: true, allowNull: false },
        publicId: { type: DataTypes.CHAR(12), allowNull: false },
        nightId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        number: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        type: { type: DataTypes.STRING(16), allowNull: false },
        file: { type: DataTypes.STRING(255), allowNull: true },
        object: { type: DataTypes.STRING(80), allowNull: false, defaultValue: '' },
        field: { type: DataTypes.STRING(80), allowNull: true },
        programmeId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: true },
        ra: { type: DataTypes.DOUBLE, allowNull: true },
        decl: { type: DataTypes.DOUBLE, allowNull: true },
        band: { type: DataTypes.CHAR(1), allowNull: true },
        utcStart: { type: DataTypes.DATE(3), allowNull: false },
        exposure: { type: DataTypes.DOUBLE, allowNull: false },
        utcMid: { type: DataTypes.DATE(3), allowNull: false },
        airmass: { type: DataTypes.DOUBLE, allowNull: true },
        altitude: { type: DataTypes.DOUBLE, allowNull: true },
        hourAngle: { type: DataTypes.DOUBLE, allowNull: true },
        moonSeparation: { type: DataTypes.DOUBLE, allowNull: true },
        sunAltitude: { type: DataTypes.DOUBLE, allowNull: false },
        fwhm: { type: DataTypes.DOUBLE, allowNull: true },
        sky: { type: DataTypes.DOUBLE, allowNull: true },
        comment: { type: DataTypes.STRING(500), allowNull: false, defaultValue: '' },
        origin: { type: DataTypes.STRING(16), allowNull: false },
        version: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 1 },
        loggedById: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        createdAt: {
          type: DataTypes.DATE(3),
          allowNull: false,
          defaultValue: literal('CURRENT_TIMESTAMP(3)'),
        },
      },
      { sequelize, modelName: 'Frame', tableName: 'frames' },
    );
  }
}
