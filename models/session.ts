import {
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** One signed-in browser. The id is the SHA-256 of the value in the cookie. */
export class Session extends Model<InferAttributes<Session>, InferCreationAttributes<Session>> {
  declare id: string;
  declare personId: string;
  declare createdAt: Date;
  declare lastSeenAt: Date;
  declare expiresAt: Date;
  declare endedAt: Date | null;
}

export function initSession(sequelize: Sequelize): void {
  Session.init(
    {
      id: { type: DataTypes.STRING(64), allowNull: false, primaryKey: true },
      personId: { type: DataTypes.STRING(36), allowNull: false, field: 'person_id' },
      createdAt: { type: DataTypes.DATE(3), allowNull: false, field: 'created_at' },
      lastSeenAt: { type: DataTypes.DATE(3), allowNull: false, field: 'last_seen_at' },
      expiresAt: { type: DataTypes.DATE(3), allowNull: false, field: 'expires_at' },
      endedAt: { type: DataTypes.DATE(3), allowNull: true, field: 'ended_at' },
    },
    { sequelize, tableName: 'sessions', modelName: 'Session', timestamps: false },
  );
}
