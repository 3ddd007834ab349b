import { DataTypes, Model, literal } from 'sequelize';
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { Solution } from './solution';
import { Night } from './night';
import { Programme } from './programme';

/** Target magnitudes made with one solution for one programme; kept when a later solution replaces them. */
export class Transformation extends Model<
  InferAttributes<Transformation>,
  InferCreationAttributes<Transformation>
> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare solutionId: number;
  declare nightId: number;
  declare programmeId: number | null;
  declare state: CreationOptional<string>;
  declare nStars: number | null;
  /** assumed colour and limits of the flags */
  declare options: object | null;
  declare nMeasurements: number | null;
  /** not usable: see lib/server/reads/target-columns.ts */
  declare nLeftOut: number | null;
  declare createdAt: CreationOptional<Date>;
  declare finishedAt: Date | null;

  static associate(): void {
    Transformation.belongsTo(Solution, { as: 'solution', foreignKey: 'solutionId' });
    Transformation.belongsTo(Night, { as: 'night', foreignKey: 'nightId' });
    Transformation.belongsTo(Programme, { as: 'programme', foreignKey: 'programmeId' });
  }

  static define(sequelize: Sequelize): void {
    Transformation.init(
      {
        id: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, autoIncrement: true, allowNull: false },
        publicId: { type: DataTypes.CHAR(12), allowNull: false },
        solutionId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        nightId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        programmeId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: true },
        state: { type: DataTypes.STRING(16), allowNull: false, defaultValue: 'queued' },
        nStars: { type: DataTypes.INTEGER.UNSIGNED, allowNull: true },
        options: { type: DataTypes.JSON, allowNull: true },
        nMeasurements: { type: DataTypes.INTEGER.UNSIGNED, allowNull: true },
        nLeftOut: { type: DataTypes.INTEGER.UNSIGNED, allowNull: true },
        createdAt: {
          type: DataTypes.DATE(3),
          allowNull: false,
          defaultValue: literal('CURRENT_TIMESTAMP(3)'),
        },
        finishedAt: { type: DataTypes.DATE(3), allowNull: true },
      },
      { sequelize, modelName: 'Transformation', tableName: 'transformations' },
    );
  }
}
