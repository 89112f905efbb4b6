import {
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** A mailed or printed link that works once. Only the digest of its token is stored. */
export class OneTimeLink extends Model<InferAttributes<OneTimeLink>, InferCreationAttributes<OneTimeLink>> {
  declare tokenDigest: string;
  declare purpose: 'first-administrator' | 'invitation' | 'password-reset';
  declare personId: string | null;
  declare createdAt: Date;
  declare expiresAt: Date;
  declare usedAt: Date | null;
}

export function initOneTimeLink(sequelize: Sequelize): void {
  OneTimeLink.init(
    {
      tokenDigest: { type: DataTypes.STRING(64), allowNull: false, field: 'token_digest', primaryKey: true },
      purpose: {
        type: DataTypes.ENUM('first-administrator', 'invitation', 'password-reset'),
        allowNull: false,
      },
      personId: { type: DataTypes.STRING(36), allowNull: true, field: 'person_id' },
      createdAt: { type: DataTypes.DATE(3), allowNull: false, field: 'created_at' },
      expiresAt: { type: DataTypes.DATE(3), allowNull: false, field: 'expires_at' },
      usedAt: { type: DataTypes.DATE(3), allowNull: true, field: 'used_at' },
    },
    { sequelize, tableName: 'one_time_links', modelName: 'OneTimeLink', timestamps: false },
  );
}
