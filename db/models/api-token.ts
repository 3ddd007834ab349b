import { DataTypes, Model, literal } from 'sequelize';
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { Person } from './person';

/** Keys for programs; shown once, kept hashed. */
export class ApiToken extends Model<InferAttributes<ApiToken>, InferCreationAttributes<ApiToken>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare personId: number;
  declare name: string;
  /** SHA-256 */
  declare tokenHash: string;
  declare scopes: object;
  declare lastUsedAt: Date | null;
  declare expiresAt: Date | null;
  declare revokedAt: Date | null;
  declare createdAt: CreationOptional<Date>;

  static associate(): void {
    ApiToken.belongsTo(Person, { as: 'person', foreignKey: 'personId' });
  }

  static define(sequelize: Sequelize): void {
    ApiToken.init(
      {
        id: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, autoIncrement: true, allowNull: false },
        publicId: { type: DataTypes.CHAR(12), allowNull: false },
        personId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        name: { type: DataTypes.STRING(80), allowNull: false },
        tokenHash: { type: DataTypes.CHAR(64), allowNull: false },
        scopes: { type: DataTypes.JSON, allowNull: false },
        lastUsedAt: { type: DataTypes.DATE(3), allowNull: true },
        expiresAt: { type: DataTypes.DATE(3), allowNull: true },
        revokedAt: { type: DataTypes.DATE(3), allowNull: true },
        createdAt: {
          type: DataTypes.DATE(3),
          allowNull: false,
          defaultValue: literal('CURRENT_TIMESTAMP(3)'),
        },
      },
      { sequelize, modelName: 'ApiToken', tableName: 'api_tokens' },
    );
  }
}
