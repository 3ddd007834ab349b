import { DataTypes, Model, literal } from 'sequelize';
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { Person } from './person';

/** Answers to writes that a client may send again. */
export class IdempotencyKey extends Model<
  InferAttributes<IdempotencyKey>,
  InferCreationAttributes<IdempotencyKey>
> {
  declare personId: number;
  declare idempotencyKey: string;
  /** SHA-256 of method, path and body */
  declare fingerprint: string;
  /** null while the first request runs */
  declare status: number | null;
  declare body: string | null;
  declare expiresAt: Date;
  declare createdAt: CreationOptional<Date>;

  static associate(): void {
    IdempotencyKey.belongsTo(Person, { as: 'person', foreignKey: 'personId' });
  }

  static define(sequelize: Sequelize): void {
    IdempotencyKey.init(
      {
        personId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, allowNull: false },
        idempotencyKey: { type: DataTypes.STRING(255), primaryKey: true, allowNull: false },
        fingerprint: { type: DataTypes.CHAR(64), allowNull: false },
        status: { type: DataTypes.SMALLINT.UNSIGNED, allowNull: true },
        body: { type: DataTypes.TEXT('long'), allowNull: true },
        expiresAt: { type: DataTypes.DATE(3), allowNull: false },
        createdAt: {
          type: DataTypes.DATE(3),
          allowNull: false,
          defaultValue: literal('CURRENT_TIMESTAMP(3)'),
        },
      },
      { sequelize, modelName: 'IdempotencyKey', tableName: 'idempotency_keys' },
    );
  }
}
