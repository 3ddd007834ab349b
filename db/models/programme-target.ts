import { DataTypes, Model } from 'sequelize';
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { Programme } from './programme';

/** What a programme observes. */
export class ProgrammeTarget extends Model<
  InferAttributes<ProgrammeTarget>,
  InferCreationAttributes<ProgrammeTarget>
> {
  declare id: CreationOptional<number>;
  declare programmeId: number;
  declare name: string;
  /** name without case, blanks and hyphens */
  declare nameKey: string;
  declare kind: string;
  /** deg J2000 */
  declare ra: number;
  /** deg J2000 */
  declare decl: number;
  declare note: CreationOptional<string>;

  static associate(): void {
    ProgrammeTarget.belongsTo(Programme, { as: 'programme', foreignKey: 'programmeId' });
  }

  static define(sequelize: Sequelize): void {
    ProgrammeTarget.init(
      {
        id: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, autoIncrement: true, allowNull: false },
        programmeId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        name: { type: DataTypes.STRING(80), allowNull: false },
        nameKey: { type: DataTypes.STRING(80), allowNull: false },
        kind: { type: DataTypes.STRING(16), allowNull: false },
        ra: { type: DataTypes.DOUBLE, allowNull: false },
        decl: { type: DataTypes.DOUBLE, allowNull: false },
        note: { type: DataTypes.STRING(500), allowNull: false, defaultValue: '' },
      },
      { sequelize, modelName: 'ProgrammeTarget', tableName: 'programme_targets' },
    );
  }
}
