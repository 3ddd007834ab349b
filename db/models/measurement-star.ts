import { DataTypes, Model } from 'sequelize';
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { MeasurementSet } from './measurement-set';
import { StandardStar } from './standard-star';

/** The distinct stars of a set and what each was matched to. */
export class MeasurementStar extends Model<
  InferAttributes<MeasurementStar>,
  InferCreationAttributes<MeasurementStar>
> {
  declare setId: number;
  declare starNo: number;
  /** as written in the table; empty where stars are given by position only */
  declare name: CreationOptional<string>;
  /** deg J2000, of its first row */
  declare ra: number | null;
  declare decl: number | null;
  declare nRows: number;
  /** line of the file */
  declare firstLine: CreationOptional<number>;
  declare standardId: number | null;
  declare matchedBy: string | null;
  /** arcsec from the published position, of its first row */
  declare separation: number | null;
  /** why it is not matched, or a caution */
  declare reason: CreationOptional<string>;

  static associate(): void {
    MeasurementStar.belongsTo(MeasurementSet, { as: 'set', foreignKey: 'setId' });
    MeasurementStar.belongsTo(StandardStar, { as: 'standard', foreignKey: 'standardId' });
  }

  static define(sequelize: Sequelize): void {
    MeasurementStar.init(
      {
        setId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, allowNull: false },
        starNo: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, allowNull: false },
        name: { type: DataTypes.STRING(80), allowNull: false, defaultValue: '' },
        ra: { type: DataTypes.DOUBLE, allowNull: true },
        decl: { type: DataTypes.DOUBLE, allowNull: true },
        nRows: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        firstLine: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 0 },
        standardId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: true },
        matchedBy: { type: DataTypes.STRING(16), allowNull: true },
        separation: { type: DataTypes.DOUBLE, allowNull: true },
        reason: { type: DataTypes.STRING(300), allowNull: false, defaultValue: '' },
      },
      { sequelize, modelName: 'MeasurementStar', tableName: 'measurement_stars' },
    );
  }
}
