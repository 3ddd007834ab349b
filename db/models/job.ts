import { DataTypes, Model, literal } from 'sequelize';
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { Person } from './person';
import { Night } from './night';
import { Programme } from './programme';

/** Work to be done once, taken by lease. */
export class Job extends Model<InferAttributes<Job>, InferCreationAttributes<Job>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare kind: string;
  declare payload: object;
  declare state: CreationOptional<string>;
  /** two jobs with one key cannot exist */
  declare dedupeKey: string | null;
  declare priority: CreationOptional<number>;
  declare runAfter: Date;
  declare tries: CreationOptional<number>;
  declare maxTries: CreationOptional<number>;
  declare leaseOwner: string | null;
  declare leaseUntil: Date | null;
  declare progress: CreationOptional<number>;
  declare message: CreationOptional<string>;
  declare result: object | null;
  declare error: object | null;
  declare cancelRequestedAt: Date | null;
  declare createdById: number | null;
  declare nightId: number | null;
  declare programmeId: number | null;
  declare createdAt: CreationOptional<Date>;
  declare startedAt: Date | null;
  declare finishedAt: Date | null;

  static associate(): void {
    Job.belongsTo(Person, { as: 'createdBy', foreignKey: 'createdById' });
    Job.belongsTo(Night, { as: 'night', foreignKey: 'nightId' });
    Job.belongsTo(Programme, { as: 'programme', foreignKey: 'programmeId' });
  }

  static define(sequelize: Sequelize): void {
    Job.init(
      {
        id: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, autoIncrement: true, allowNull: false },
        publicId: { type: DataTypes.CHAR(12), allowNull: false },
        kind: { type: DataTypes.STRING(32), allowNull: false },
        payload: { type: DataTypes.JSON, allowNull: false },
        state: { type: DataTypes.STRING(16), allowNull: false, defaultValue: 'queued' },
        dedupeKey: { type: DataTypes.STRING(120), allowNull: true },
        priority: { type: DataTypes.TINYINT, allowNull: false, defaultValue: 0 },
        runAfter: { type: DataTypes.DATE(3), allowNull: false },
        tries: { type: DataTypes.TINYINT.UNSIGNED, allowNull: false, defaultValue: 0 },
        maxTries: { type: DataTypes.TINYINT.UNSIGNED, allowNull: false, defaultValue: 5 },
        leaseOwner: { type: DataTypes.STRING(64), allowNull: true },
        leaseUntil: { type: DataTypes.DATE(3), allowNull: true },
        progress: { type: DataTypes.DOUBLE, allowNull: false, defaultValue: 0 },
        message: { type: DataTypes.STRING(300), allowNull: false, defaultValue: '' },
        result: { type: DataTypes.JSON, allowNull: true },
        error: { type: DataTypes.JSON, allowNull: true },
        cancelRequestedAt: { type: DataTypes.DATE(3), allowNull: true },
        createdById: { type: DataTypes.INTEGER.UNSIGNED, allowNull: true },
        nightId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: true },
        programmeId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: true },
        createdAt: {
          type: DataTypes.DATE(3),
          allowNull: false,
          defaultValue: literal('CURRENT_TIMESTAMP(3)'),
        },
        startedAt: { type: DataTypes.DATE(3), allowNull: true },
        finishedAt: { type: DataTypes.DATE(3), allowNull: true },
      },
      { sequelize, modelName: 'Job', tableName: 'jobs' },
    );
  }
}
