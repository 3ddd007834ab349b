import { DataTypes, Model } from 'sequelize';
import type { InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { MeasurementSet } from './measurement-set';
import { Solution } from './solution';

/** Which measurement sets a solution rests on, and which it is used for. */
export class SolutionSet extends Model<InferAttributes<SolutionSet>, InferCreationAttributes<SolutionSet>> {
  declare solutionId: number;
  declare setId: number;
  /** standards: fitted; targets: transformed since its approval */
  declare purpose: string;

  static associate(): void {
    SolutionSet.belongsTo(Solution, { as: 'solution', foreignKey: 'solutionId' });
    SolutionSet.belongsTo(MeasurementSet, { as: 'set', foreignKey: 'setId' });
  }

  static define(sequelize: Sequelize): void {
    SolutionSet.init(
      {
        solutionId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, allowNull: false },
        setId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, allowNull: false },
        purpose: { type: DataTypes.STRING(16), primaryKey: true, allowNull: false },
      },
      { sequelize, modelName: 'SolutionSet', tableName: 'solution_sets' },
    );
  }
}
