import { DataTypes, Model } from 'sequelize';
import type { InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { Night } from './night';
import { Person } from './person';

/** Whose night it is. */
export class NightObserver extends Model<
  InferAttributes<NightObserver>,
  InferCreationAttributes<NightObserver>
> {
  declare nightId: number;
  declare personId: number;

  static associate(): void {
    NightObserver.belongsTo(Night, { as: 'night', foreignKey: 'nightId' });
    NightObserver.belongsTo(Person, { as: 'person', foreignKey: 'personId' });
  }

  static define(sequelize: Sequelize): void {
    NightObserver.init(
      {
        nightId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, allowNull: false },
        personId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, allowNull: false },
      },
      { sequelize, modelName: 'NightObserver', tableName: 'night_observers' },
    );
  }
}
