import { DataTypes, Model } from 'sequelize';
import type { InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize';

/** Failed sign-ins, which slow down the next ones. */
export class SignInFailure extends Model<
  InferAttributes<SignInFailure>,
  InferCreationAttributes<SignInFailure>
> {
  /** SHA-256 of the e-mail address or of the network address */
  declare subject: string;
  declare failures: number;
  declare lastFailedAt: Date;
  declare nextTryAt: Date;

  static define(sequelize: Sequelize): void {
    SignInFailure.init(
      {
        subject: { type: DataTypes.CHAR(64), primaryKey: true, allowNull: false },
        failures: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
        lastFailedAt: { type: DataTypes.DATE(3), allowNull: false },
        nextTryAt: { type: DataTypes.DATE(3), allowNull: false },
      },
      { sequelize, modelName: 'SignInFailure', tableName: 'sign_in_failures' },
    );
  }
}
