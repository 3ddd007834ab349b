import { DataTypes, Model, literal } from 'sequelize';
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';

/** People who sign in. */
export class Person extends Model<InferAttributes<Person>, InferCreationAttributes<Person>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare email: string;
  declare name: string;
  /** argon2id; null until the one-time link is used */
  declare passwordHash: string | null;
  declare light: CreationOptional<string>;
  declare disabledAt: Date | null;
  declare createdAt: CreationOptional<Date>;

  static define(sequelize: Sequelize): void {
    Person.init(
      {
        id: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, autoIncrement: true, allowNull: false },
        publicId: { type: DataTypes.CHAR(12), allowNull: false },
        email: { type: DataTypes.STRING(254), allowNull: false },
        name: { type: DataTypes.STRING(120), allowNull: false },
        passwordHash: { type: DataTypes.STRING(255), allowNull: true },
        light: { type: DataTypes.STRING(16), allowNull: false, defaultValue: 'day' },
        disabledAt: { type: DataTypes.DATE(3), allowNull: true },
        createdAt: {
          type: DataTypes.DATE(3),
          allowNull: false,
          defaultValue: literal('CURRENT_TIMESTAMP(3)'),
        },
      },
      { sequelize, modelName: 'Person', tableName: 'people' },
    );
  }
}
