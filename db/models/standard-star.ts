import { DataTypes, Model } from 'sequelize';
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { StandardSource } from './standard-source';

/** Stars with published magnitudes on the standard system. */
export class StandardStar extends Model<
  InferAttributes<StandardStar>,
  InferCreationAttributes<StandardStar>
> {
  declare id: CreationOptional<number>;
  declare sourceId: number;
  declare name: string;
  /** name without case, blanks and hyphens */
  declare nameKey: string;
  declare field: string;
  /** deg J2000 */
  declare ra: number;
  /** deg J2000 */
  declare decl: number;
  /** mas per year, times cos dec */
  declare pmRa: number | null;
  /** mas per year */
  declare pmDec: number | null;
  declare v: number;
  declare bv: number;
  declare ub: number | null;
  declare vr: number | null;
  declare ri: number | null;
  declare vi: number | null;
  declare eV: number | null;
  declare eBv: number | null;
  declare eUb: number | null;
  declare eVr: number | null;
  declare eRi: number | null;
  declare eVi: number | null;
  declare nObservations: number | null;
  declare isUsable: CreationOptional<boolean>;
  declare caution: CreationOptional<string>;

  static associate(): void {
    StandardStar.belongsTo(StandardSource, { as: 'source', foreignKey: 'sourceId' });
  }

  static define(sequelize: Sequelize): void {
    StandardStar.init(
      {
        id: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, autoIncrement: true, allowNull: false },
        sourceId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        name: { type: DataTypes.STRING(80), allowNull: false },
        nameKey: { type: DataTypes.STRING(80), allowNull: false },
        field: { type: DataTypes.STRING(80), allowNull: false },
        ra: { type: DataTypes.DOUBLE, allowNull: false },
        decl: { type: DataTypes.DOUBLE, allowNull: false },
        pmRa: { type: DataTypes.DOUBLE, allowNull: true },
        pmDec: { type: DataTypes.DOUBLE, allowNull: true },
        v: { type: DataTypes.DOUBLE, allowNull: false },
        bv: { type: DataTypes.DOUBLE, allowNull: false },
        ub: { type: DataTypes.DOUBLE, allowNull: true },
        vr: { type: DataTypes.DOUBLE, allowNull: true },
        ri: { type: DataTypes.DOUBLE, allowNull: true },
        vi: { type: DataTypes.DOUBLE, allowNull: true },
        eV: { type: DataTypes.DOUBLE, allowNull: true },
        eBv: { type: DataTypes.DOUBLE, allowNull: true },
        eUb: { type: DataTypes.DOUBLE, allowNull: true },
        eVr: { type: DataTypes.DOUBLE, allowNull: true },
        eRi: { type: DataTypes.DOUBLE, allowNull: true },
        eVi: { type: DataTypes.DOUBLE, allowNull: true },
        nObservations: { type: DataTypes.SMALLINT.UNSIGNED, allowNull: true },
        isUsable: { type: DataTypes.BOOLEAN, allowNull: false, defaultValue: true },
        caution: { type: DataTypes.STRING(300), allowNull: false, defaultValue: '' },
      },
      { sequelize, modelName: 'StandardStar', tableName: 'standard_stars' },
    );
  }
}
