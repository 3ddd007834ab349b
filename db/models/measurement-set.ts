import { DataTypes, Model, literal } from 'sequelize';
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { Night } from './night';
import { Person } from './person';

/** Uploaded tables of instrumental magnitudes, kept whole. */
export class MeasurementSet extends Model<
  InferAttributes<MeasurementSet>,
  InferCreationAttributes<MeasurementSet>
> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare nightId: number;
  declare kind: string;
  declare name: string;
  declare state: CreationOptional<string>;
  declare fileName: string;
  declare contentType: string;
  /** bytes */
  declare size: number;
  /** of the original bytes, which lib/server/storage keeps under this name */
  declare sha256: string;
  /** arcsec, for matching by position */
  declare tolerance: number;
  /** column of the table to header in the file, as applied */
  declare mapping: object;
  /** the lines before the header that begin with # */
  declare comments: string;
  declare nRows: number | null;
  /** rows matched to a standard star */
  declare nMatched: number | null;
  declare nFramesCreated: CreationOptional<number>;
  declare nFaults: CreationOptional<number>;
  declare uploadedById: number;
  declare checkedAt: Date | null;
  declare createdAt: CreationOptional<Date>;

  static associate(): void {
    MeasurementSet.belongsTo(Night, { as: 'night', foreignKey: 'nightId' });
    MeasurementSet.belongsTo(Person, { as: 'uploadedBy', foreignKey: 'uploadedById' });
  }

  static define(sequelize: Sequelize): void {
    MeasurementSet.init(
      {
        id: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, autoIncrement: true, allowNull: false },
        publicId: { type: DataTypes.CHAR(12), allowNull: false },
        nightId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        kind: { type: DataTypes.STRING(16), allowNull: false },
        name: { type: DataTypes.STRING(120), allowNull: false },
        state: { type: DataTypes.STRING(16), allowNull: false, defaultValue: 'received' },
        fileName: { type: DataTypes.STRING(255), allowNull: false },
        contentType: { type: DataTypes.STRING(80), allowNull: false },
        size: { type: DataTypes.BIGINT.UNSIGNED, allowNull: false },
        sha256: { type: DataTypes.CHAR(64), allowNull: false },
        tolerance: { type: DataTypes.DOUBLE, allowNull: false },
        mapping: { type: DataTypes.JSON, allowNull: false },
        comments: { type: DataTypes.TEXT('medium'), allowNull: false },
        nRows: { type: DataTypes.INTEGER.UNSIGNED, allowNull: true },
        nMatched: { type: DataTypes.INTEGER.UNSIGNED, allowNull: true },
        nFramesCreated: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 0 },
        nFaults: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 0 },
        uploadedById: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        checkedAt: { type: DataTypes.DATE(3), allowNull: true },
        createdAt: {
          type: DataTypes.DATE(3),
          allowNull: false,
          defaultValue: literal('CURRENT_TIMESTAMP(3)'),
        },
      },
      { sequelize, modelName: 'MeasurementSet', tableName: 'measurement_sets' },
    );
  }
}
