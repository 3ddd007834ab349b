import { DataTypes, Model, literal } from 'sequelize';
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { Night } from './night';
import { Person } from './person';

/** Observing time lost, and to what. */
export class TimeLoss extends Model<InferAttributes<TimeLoss>, InferCreationAttributes<TimeLoss>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare nightId: number;
  declare cause: string;
  declare minutes: number;
  declare comment: CreationOptional<string>;
  declare recordedById: number;
  declare createdAt: CreationOptional<Date>;

  static associate(): void {
    TimeLoss.belongsTo(Night, { as: 'night', foreignKey: 'nightId' });
    TimeLoss.belongsTo(Person, { as: 'recordedBy', foreignKey: 'recordedById' });
  }

  static define(sequelize: Sequelize): void {
    TimeLoss.init(
      {
        id: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, autoIncrement: true, allowNull: false },
        publicId: { type: DataTypes.CHAR(12), allowNull: false },
        nightId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        cause: { type: DataTypes.STRING(16), allowNull: false },
        minutes: { type: DataTypes.SMALLINT.UNSIGNED, allowNull: false },
        comment: { type: DataTypes.STRING(500), allowNull: false, defaultValue: '' },
        recordedById: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        createdAt: {
          type: DataTypes.DATE(3),
          allowNull: false,
          defaultValue: literal('CURRENT_TIMESTAMP(3)'),
        },
      },
      { sequelize, modelName: 'TimeLoss', tableName: 'time_losses' },
    );
  }
}
