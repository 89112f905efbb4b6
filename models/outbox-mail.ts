import {
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** A mail queued in the transaction of its cause. */
export class OutboxMail extends Model<InferAttributes<OutboxMail>, InferCreationAttributes<OutboxMail>> {
  declare id: string;
  declare kind: string;
  declare cause: string;
  declare personId: string | null;
  declare address: string;
  declare payload: string;
  declare priority: number;
  declare state: 'queued' | 'sent' | 'overtaken' | 'dead';
  declare attempts: number;
  declare leaseOwner: string | null;
  declare leaseUntil: Date | null;
  declare nextAttemptAt: Date | null;
  declare messageId: string;
  declare lastError: string | null;
  declare createdAt: Date;
  declare sentAt: Date | null;
}

export function initOutboxMail(sequelize: Sequelize): void {
  OutboxMail.init(
    {
      id: { type: DataTypes.STRING(36), allowNull: false, primaryKey: true },
      kind: { type: DataTypes.STRING(60), allowNull: false },
      cause: { type: DataTypes.STRING(120), allowNull: false },
      personId: { type: DataTypes.STRING(36), allowNull: true, field: 'person_id' },
      address: { type: DataTypes.STRING(254), allowNull: false },
      payload: { type: DataTypes.TEXT('long'), allowNull: false },
      priority: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
      state: { type: DataTypes.ENUM('queued', 'sent', 'overtaken', 'dead'), allowNull: false },
      attempts: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
      leaseOwner: { type: DataTypes.STRING(80), allowNull: true, field: 'lease_owner' },
      leaseUntil: { type: DataTypes.DATE(6), allowNull: true, field: 'lease_until' },
      nextAttemptAt: { type: DataTypes.DATE(6), allowNull: true, field: 'next_attempt_at' },
      messageId: { type: DataTypes.STRING(200), allowNull: false, field: 'message_id' },
      lastError: { type: DataTypes.STRING(500), allowNull: true, field: 'last_error' },
      createdAt: { type: DataTypes.DATE(3), allowNull: false, field: 'created_at' },
      sentAt: { type: DataTypes.DATE(3), allowNull: true, field: 'sent_at' },
    },
    { sequelize, tableName: 'outbox', modelName: 'OutboxMail', timestamps: false },
  );
}
