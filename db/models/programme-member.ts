import { DataTypes, Model } from 'sequelize';
import type { InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { Programme } from './programme';
import { Person } from './person';

/** Who belongs to a programme, and as what. */
export class ProgrammeMember extends Model<
  InferAttributes<ProgrammeMember>,
  InferCreationAttributes<ProgrammeMember>
> {
  declare programmeId: number;
  declare personId: number;
  declare role: string;

  static associate(): void {
    ProgrammeMember.belongsTo(Programme, { as: 'programme', foreignKey: 'programmeId' });
    ProgrammeMember.belongsTo(Person, { as: 'person', foreignKey: 'personId' });
  }

  static define(sequelize: Sequelize): void {
    ProgrammeMember.init(
      {
        programmeId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, allowNull: false },
        personId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, allowNull: false },
        role: { type: DataTypes.STRING(16), allowNull: false },
      },
      { sequelize, modelName: 'ProgrammeMember', tableName: 'programme_members' },
    );
  }
}
