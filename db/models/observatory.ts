import { DataTypes, Model, literal } from 'sequelize';
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';

/** One row: whose installation this is, and its rules (settings by lib/contracts/settings). */
export class Observatory extends Model<InferAttributes<Observatory>, InferCreationAttributes<Observatory>> {
  declare id: CreationOptional<number>;
  declare name: string;
  declare isDemo: CreationOptional<boolean>;
  declare settings: object;
  declare createdAt: CreationOptional<Date>;

  static define(sequelize: Sequelize): void {
    Observatory.init(
      {
        id: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, autoIncrement: true, allowNull: false },
        name: { type: DataTypes.STRING(120), allowNull: false },
        isDemo: { type: DataTypes.BOOLEAN, allowNull: false, defaultValue: false },
        settings: { type: DataTypes.JSON, allowNull: false },
        createdAt: {
          type: DataTypes.DATE(3),
          allowNull: false,
          defaultValue: literal('CURRENT_TIMESTAMP(3)'),
        },
      },
      { sequelize, modelName: 'Observatory', tableName: 'observatories' },
    );
  }
}
