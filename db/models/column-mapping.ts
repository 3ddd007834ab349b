import { DataTypes, Model } from 'sequelize';
import type { InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { Telescope } from './telescope';
import { Person } from './person';

/** How a telescope's tables name their columns, as somebody said once. */
export class ColumnMapping extends Model<
  InferAttributes<ColumnMapping>,
  InferCreationAttributes<ColumnMapping>
> {
  declare telescopeId: number;
  /** SHA-256 of the lower-case header names in order */
  declare headerKey: string;
  declare headers: object;
  declare mapping: object;
  declare savedById: number;
  declare savedAt: Date;

  static associate(): void {
    ColumnMapping.belongsTo(Telescope, { as: 'telescope', foreignKey: 'telescopeId' });
    ColumnMapping.belongsTo(Person, { as: 'savedBy', foreignKey: 'savedById' });
  }

  static define(sequelize: Sequelize): void {
    ColumnMapping.init(
      {
        telescopeId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, allowNull: false },
        headerKey: { type: DataTypes.CHAR(64), primaryKey: true, allowNull: false },
        headers: { type: DataTypes.JSON, allowNull: false },
        mapping: { type: DataTypes.JSON, allowNull: false },
        savedById: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        savedAt: { type: DataTypes.DATE(3), allowNull: false },
      },
      { sequelize, modelName: 'ColumnMapping', tableName: 'column_mappings' },
    );
  }
}
