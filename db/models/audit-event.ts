import { DataTypes, Model, literal } from 'sequelize';
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { Person } from './person';
import { Night } from './night';
import { Programme } from './programme';

/** Who did what to what, with the values before and after. Only ever added to. */
export class AuditEvent extends Model<InferAttributes<AuditEvent>, InferCreationAttributes<AuditEvent>> {
  declare id: CreationOptional<number>;
  declare utc: CreationOptional<Date>;
  declare personId: number | null;
  declare act: string;
  declare subjectKind: string;
  /** public id */
  declare subjectId: string;
  declare nightId: number | null;
  declare programmeId: number | null;
  declare reason: CreationOptional<string>;
  declare beforeValues: object | null;
  declare afterValues: object | null;
  declare requestId: CreationOptional<string>;

  static associate(): void {
    AuditEvent.belongsTo(Person, { as: 'person', foreignKey: 'personId' });
    AuditEvent.belongsTo(Night, { as: 'night', foreignKey: 'nightId' });
    AuditEvent.belongsTo(Programme, { as: 'programme', foreignKey: 'programmeId' });
  }

  static define(sequelize: Sequelize): void {
    AuditEvent.init(
      {
        id: { type: DataTypes.BIGINT.UNSIGNED, primaryKey: true, autoIncrement: true, allowNull: false },
        utc: { type: DataTypes.DATE(3), allowNull: false, defaultValue: literal('CURRENT_TIMESTAMP(3)') },
        personId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: true },
        act: { type: DataTypes.STRING(48), allowNull: false },
        subjectKind: { type: DataTypes.STRING(32), allowNull: false },
        subjectId: { type: DataTypes.STRING(64), allowNull: false },
        nightId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: true },
        programmeId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: true },
        reason: { type: DataTypes.STRING(500), allowNull: false, defaultValue: '' },
        beforeValues: { type: DataTypes.JSON, allowNull: true },
        afterValues: { type: DataTypes.JSON, allowNull: true },
        requestId: { type: DataTypes.STRING(64), allowNull: false, defaultValue: '' },
      },
      { sequelize, modelName: 'AuditEvent', tableName: 'audit_events' },
    );
  }
}
