import { DataTypes, Model } from 'sequelize';
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';

/** Published tables of standard stars. */
export class StandardSource extends Model<
  InferAttributes<StandardSource>,
  InferCreationAttributes<StandardSource>
> {
  declare id: CreationOptional<number>;
  declare code: string;
  declare citation: string;
  declare note: string;
  /** mag, where the table gives none */
  declare defaultError: number;

  static define(sequelize: Sequelize): void {
    StandardSource.init(
      {
        id: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, autoIncrement: true, allowNull: false },
        code: { type: DataTypes.STRING(32), allowNull: false },
        citation: { type: DataTypes.STRING(300), allowNull: false },
        note: { type: DataTypes.TEXT, allowNull: false },
        defaultError: { type: DataTypes.DOUBLE, allowNull: false },
      },
      { sequelize, modelName: 'StandardSource', tableName: 'standard_sources' },
    );
  }
}
