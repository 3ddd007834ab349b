import { DataTypes, Model, literal } from 'sequelize';
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { Person } from './person';

/** Links by which a person sets a password; each works once. */
export class OneTimeLink extends Model<InferAttributes<OneTimeLink>, InferCreationAttributes<OneTimeLink>> {
  declare id: CreationOptional<number>;
  declare personId: number;
  declare purpose: string;
  declare tokenHash: string;
  declare expiresAt: Date;
  declare usedAt: Date | null;
  declare createdById: number | null;
  declare createdAt: CreationOptional<Date>;

  static associate(): void {
    OneTimeLink.belongsTo(Person, { as: 'person', foreignKey: 'personId' });
    OneTimeLink.belongsTo(Person, { as: 'createdBy', foreignKey: 'createdById' });
  }

  static define(sequelize: Sequelize): void {
    OneTimeLink.init(
      {
        id: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, autoIncrement: true, allowNull: false },
        personId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        purpose: { type: DataTypes.STRING(16), allowNull: false },
        tokenHash: { type: DataTypes.CHAR(64), allowNull: false },
        expiresAt: { type: DataTypes.DATE(3), allowNull: false },
        usedAt: { type: DataTypes.DATE(3), allowNull: true },
        createdById: { type: DataTypes.INTEGER.UNSIGNED, allowNull: true },
        createdAt: {
          type: DataTypes.DATE(3),
          allowNull: false,
          defaultValue: literal('CURRENT_TIMESTAMP(3)'),
        },
      },
      { sequelize, modelName: 'OneTimeLink', tableName: 'one_time_links' },
    );
  }
}
