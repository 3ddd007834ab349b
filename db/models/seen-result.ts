import { DataTypes, Model, literal } from 'sequelize';
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { Person } from './person';
import { Transformation } from './transformation';

/** Which results a person has opened: the others are new to them. */
export class SeenResult extends Model<InferAttributes<SeenResult>, InferCreationAttributes<SeenResult>> {
  declare personId: number;
  declare transformationId: number;
  declare seenAt: CreationOptional<Date>;

  static associate(): void {
    SeenResult.belongsTo(Person, { as: 'person', foreignKey: 'personId' });
    SeenResult.belongsTo(Transformation, { as: 'transformation', foreignKey: 'transformationId' });
  }

  static define(sequelize: Sequelize): void {
    SeenResult.init(
      {
        personId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, allowNull: false },
        transformationId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, allowNull: false },
        seenAt: {
          type: DataTypes.DATE(3),
          allowNull: false,
          defaultValue: literal('CURRENT_TIMESTAMP(3)'),
        },
      },
      { sequelize, modelName: 'SeenResult', tableName: 'seen_results' },
    );
  }
}
