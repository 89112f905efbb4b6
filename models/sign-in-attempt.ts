import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** The unchained log of attempts to prove an identity, which back-off is computed from. */
export class SignInAttempt extends Model<
  InferAttributes<SignInAttempt>,
  InferCreationAttributes<SignInAttempt>
> {
  declare id: CreationOptional<number>;
  declare emailDigest: string;
  declare clientAddress: string;
  declare purpose: 'sign-in' | 'signature';
  declare succeeded: boolean;
  declare attemptedAt: Date;
}

export function initSignInAttempt(sequelize: Sequelize): void {
  SignInAttempt.init(
    {
      id: { type: DataTypes.BIGINT, allowNull: false, primaryKey: true, autoIncrement: true },
      emailDigest: { type: DataTypes.STRING(64), allowNull: false, field: 'email_digest' },
      clientAddress: { type: DataTypes.STRING(64), allowNull: false, field: 'client_address' },
      purpose: { type: DataTypes.ENUM('sign-in', 'signature'), allowNull: false },
      succeeded: { type: DataTypes.BOOLEAN, allowNull: false },
      attemptedAt: { type: DataTypes.DATE(3), allowNull: false, field: 'attempted_at' },
    },
    { sequelize, tableName: 'sign_in_attempts', modelName: 'SignInAttempt', timestamps: false },
  );
}
