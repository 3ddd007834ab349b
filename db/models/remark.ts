import { DataTypes, Model, literal } from 'sequelize';
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { Night } from './night';
import { Person } from './person';

/** Free text in the log. */
export class Remark extends Model<InferAttributes<Remark>, InferCreationAttributes<Remark>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare nightId: number;
  declare utc: Date;
  declare text: string;
  declare writtenById: number;
  declare createdAt: CreationOptional<Date>;

  static associate(): void {
    Remark.belongsTo(Night, { as: 'night', foreignKey: 'nightId' });
    Remark.belongsTo(Person, { as: 'writtenBy', foreignKey: 'writtenById' });
  }

  static define(sequelize: Sequelize): void {
    Remark.init(
      {
        id: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, autoIncrement: true, allowNull: false },
        publicId: { type: DataTypes.CHAR(12), allowNull: false },
        nightId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        utc: { type: DataTypes.DATE(3), allowNull: false },
        text: { type: DataTypes.TEXT, allowNull: false },
        writtenById: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        createdAt: {
          type: DataTypes.DATE(3),
          allowNull: false,
          defaultValue: literal('CURRENT_TIMESTAMP(3)'),
        },
      },
      { sequelize, modelName: 'Remark', tableName: 'remarks' },
    );
  }
}
