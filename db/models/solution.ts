import { DataTypes, Model, literal } from 'sequelize';
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';
import { Night } from './night';
import { Person } from './person';

/** One fit: asked, solved, proposed, decided. Nothing of it changes once it is approved but its state. */
export class Solution extends Model<InferAttributes<Solution>, InferCreationAttributes<Solution>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare nightId: number;
  /** within its night, from 1 */
  declare number: number;
  declare state: CreationOptional<string>;
  /** bands, terms, priors, airmass formula, limits: everything that was asked */
  declare model: object;
  /** measurement sets with their SHA-256, nights, standards source, equipment epoch */
  declare inputs: object;
  /** SHA-256 of the observations as the fit saw them */
  declare inputHash: string | null;
  declare softwareVersion: string;
  /** determined, undetermined; null until solved */
  declare outcome: string | null;
  declare findings: object | null;
  declare evidence: object | null;
  declare suggestedVerdict: string | null;
  declare nObservations: CreationOptional<number>;
  declare nUsed: CreationOptional<number>;
  declare nStars: CreationOptional<number>;
  declare nFrames: CreationOptional<number>;
  declare verdict: string | null;
  /** the solution this one was made from */
  declare followsId: number | null;
  declare supersededById: number | null;
  declare version: CreationOptional<number>;
  declare createdById: number;
  declare solvedAt: Date | null;
  declare proposedById: number | null;
  declare proposedAt: Date | null;
  declare approvedById: number | null;
  declare approvedAt: Date | null;
  declare withdrawnById: number | null;
  declare withdrawnAt: Date | null;
  declare createdAt: CreationOptional<Date>;

  static associate(): void {
    Solution.belongsTo(Night, { as: 'night', foreignKey: 'nightId' });
    Solution.belongsTo(Solution, { as: 'follows', foreignKey: 'followsId' });
    Solution.belongsTo(Solution, { as: 'supersededBy', foreignKey: 'supersededById' });
    Solution.belongsTo(Person, { as: 'createdBy', foreignKey: 'createdById' });
    Solution.belongsTo(Person, { as: 'proposedBy', foreignKey: 'proposedById' });
    Solution.belongsTo(Person, { as: 'approvedBy', foreignKey: 'approvedById' });
    Solution.belongsTo(Person, { as: 'withdrawnBy', foreignKey: 'withdrawnById' });
  }

  static define(sequelize: Sequelize): void {
    Solution.init(
      {
        id: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, autoIncrement: true, allowNull: false },
        publicId: { type: DataTypes.CHAR(12), allowNull: false },
        nightId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        number: { type: DataTypes.SMALLINT.UNSIGNED, allowNull: false },
        state: { type: DataTypes.STRING(16), allowNull: false, defaultValue: 'draft' },
        model: { type: DataTypes.JSON, allowNull: false },
        inputs: { type: DataTypes.JSON, allowNull: false },
        inputHash: { type: DataTypes.CHAR(64), allowNull: true },
        softwareVersion: { type: DataTypes.STRING(32), allowNull: false },
        outcome: { type: DataTypes.STRING(16), allowNull: true },
        findings: { type: DataTypes.JSON, allowNull: true },
        evidence: { type: DataTypes.JSON, allowNull: true },
        suggestedVerdict: { type: DataTypes.STRING(24), allowNull: true },
        nObservations: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 0 },
        nUsed: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 0 },
        nStars: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 0 },
        nFrames: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 0 },
        verdict: { type: DataTypes.STRING(24), allowNull: true },
        followsId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: true },
        supersededById: { type: DataTypes.INTEGER.UNSIGNED, allowNull: true },
        version: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 1 },
        createdById: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        solvedAt: { type: DataTypes.DATE(3), allowNull: true },
        proposedById: { type: DataTypes.INTEGER.UNSIGNED, allowNull: true },
        proposedAt: { type: DataTypes.DATE(3), allowNull: true },
        approvedById: { type: DataTypes.INTEGER.UNSIGNED, allowNull: true },
        approvedAt: { type: DataTypes.DATE(3), allowNull: true },
        withdrawnById: { type: DataTypes.INTEGER.UNSIGNED, allowNull: true },
        withdrawnAt: { type: DataTypes.DATE(3), allowNull: true },
        createdAt: {
          type: DataTypes.DATE(3),
          allowNull: false,
          defaultValue: literal('CURRENT_TIMESTAMP(3)'),
        },
      },
      { sequelize, modelName: 'Solution', tableName: 'solutions' },
    );
  }
}
