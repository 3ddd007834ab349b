import { DataTypes, Model, literal } from 'sequelize';
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';

/** Awarded observing proposals: the boundary of access to data. */
export class Programme extends Model<InferAttributes<Programme>, InferCreationAttributes<Programme>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare code: string;
  declare title: string;
  declare summary: string;
  declare proprietaryMonths: CreationOptional<number>;
  /** set when the PI ends the period early */
  declare proprietaryEndedAt: Date | null;
  declare archivedAt: Date | null;
  declare createdAt: CreationOptional<Date>;

  static define(sequelize: Sequelize): void {
    Programme.init(
      {
        id: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, autoIncrement: true, allowNull: false },
        publicId: { type: DataTypes.CHAR(12), allowNull: false },
        code: { type: DataTypes.STRING(32), allowNull: false },
        title: { type: DataTypes.STRING(200), allowNull: false },
        summary: { type: DataTypes.TEXT, allowNull: false },
        proprietaryMonths: { type: DataTypes.SMALLINT.UNSIGNED, allowNull: false, defaultValue: 12 },
        proprietaryEndedAt: { type: DataTypes.DATE(3), allowNull: true },
        archivedAt: { type: DataTypes.DATE(3), allowNull: true },
        createdAt: {
          type: DataTypes.DATE(3),
          allowNull: false,
          defaultValue: literal('CURRENT_TIMESTAMP(3)'),
        },
      },
      { sequelize, modelName: 'Programme', tableName: 'programmes' },
    );
  }
}
