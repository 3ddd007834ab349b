import { DataTypes, Model, literal } from 'sequelize';
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { Person } from './person';

/** Outbox: written with the change that causes it, sent later, once. */
export class Mail extends Model<InferAttributes<Mail>, InferCreationAttributes<Mail>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare kind: string;
  /** one cause and one recipient: one mail */
  declare dedupeKey: string;
  declare messageId: string;
  declare recipient: string;
  declare personId: number | null;
  declare subject: string;
  declare text: string;
  declare html: string;
  declare state: CreationOptional<string>;
  declare tries: CreationOptional<number>;
  declare nextTryAt: Date;
  declare lastError: CreationOptional<string>;
  declare sentAt: Date | null;
  declare createdAt: CreationOptional<Date>;

  static associate(): void {
    Mail.belongsTo(Person, { as: 'person', foreignKey: 'personId' });
  }

  static define(sequelize: Sequelize): void {
    Mail.init(
      {
        id: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, autoIncrement: true, allowNull: false },
        publicId: { type: DataTypes.CHAR(12), allowNull: false },
        kind: { type: DataTypes.STRING(32), allowNull: false },
        dedupeKey: { type: DataTypes.STRING(160), allowNull: false },
        messageId: { type: DataTypes.STRING(160), allowNull: false },
        recipient: { type: DataTypes.STRING(254), allowNull: false },
        personId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: true },
        subject: { type: DataTypes.STRING(200), allowNull: false },
        text: { type: DataTypes.TEXT('medium'), allowNull: false },
        html: { type: DataTypes.TEXT('medium'), allowNull: false },
        state: { type: DataTypes.STRING(16), allowNull: false, defaultValue: 'queued' },
        tries: { type: DataTypes.SMALLINT.UNSIGNED, allowNull: false, defaultValue: 0 },
        nextTryAt: { type: DataTypes.DATE(3), allowNull: false },
        lastError: { type: DataTypes.STRING(500), allowNull: false, defaultValue: '' },
        sentAt: { type: DataTypes.DATE(3), allowNull: true },
        createdAt: {
          type: DataTypes.DATE(3),
          allowNull: false,
          defaultValue: literal('CURRENT_TIMESTAMP(3)'),
        },
      },
      { sequelize, modelName: 'Mail', tableName: 'mails' },
    );
  }
}
