import { DataTypes, Model, literal } from 'sequelize';
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { Person } from './person';

/** Signed-in browsers. */
export class Session extends Model<InferAttributes<Session>, InferCreationAttributes<Session>> {
  /** SHA-256 of the cookie value, which itself is never stored */
  declare id: string;
  declare personId: number;
  declare expiresAt: Date;
  /** The browser's own name for itself, cut to 255 characters. */
  declare userAgent: CreationOptional<string>;
  declare createdAt: CreationOptional<Date>;

  static associate(): void {
    Session.belongsTo(Person, { as: 'person', foreignKey: 'personId' });
  }

  static define(sequelize: Sequelize): void {
    Session.init(
      {
        id: { type: DataTypes.CHAR(64), primaryKey: true, allowNull: false },
        personId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        expiresAt: { type: DataTypes.DATE(3), allowNull: false },
        userAgent: { type: DataTypes.STRING(255), allowNull: false, defaultValue: '' },
        createdAt: {
          type: DataTypes.DATE(3),
          allowNull: false,
          defaultValue: literal('CURRENT_TIMESTAMP(3)'),
        },
      },
      { sequelize, modelName: 'Session', tableName: 'sessions' },
    );
  }
}
