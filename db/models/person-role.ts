import { DataTypes, Model } from 'sequelize';
import type { InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { Person } from './person';

/** Roles that hold for the whole observatory. */
export class PersonRole extends Model<InferAttributes<PersonRole>, InferCreationAttributes<PersonRole>> {
  declare personId: number;
  declare role: string;

  static associate(): void {
    PersonRole.belongsTo(Person, { as: 'person', foreignKey: 'personId' });
  }

  static define(sequelize: Sequelize): void {
    PersonRole.init(
      {
        personId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, allowNull: false },
        role: { type: DataTypes.STRING(16), primaryKey: true, allowNull: false },
      },
      { sequelize, modelName: 'PersonRole', tableName: 'person_roles' },
    );
  }
}
