import {
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** A link of a chain of the trail. Append-only. */
export class Event extends Model<InferAttributes<Event>, InferCreationAttributes<Event>> {
  declare id: string;
  declare chain: string;
  declare sequence: number;
  declare occurredAt: Date;
  declare personId: string | null;
  declare role: string;
  declare kind: string;
  declare payloadDigest: string;
  declare previousHash: string;
  declare hash: string;
}

export function initEvent(sequelize: Sequelize): void {
  Event.init(
    {
      id: { type: DataTypes.STRING(36), allowNull: false, primaryKey: true },
      chain: { type: DataTypes.STRING(36), allowNull: false },
      sequence: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
      occurredAt: { type: DataTypes.DATE(3), allowNull: false, field: 'occurred_at' },
      personId: { type: DataTypes.STRING(36), allowNull: true, field: 'person_id' },
      role: { type: DataTypes.STRING(20), allowNull: false },
      kind: { type: DataTypes.STRING(60), allowNull: false },
      payloadDigest: { type: DataTypes.STRING(64), allowNull: false, field: 'payload_digest' },
      previousHash: { type: DataTypes.STRING(64), allowNull: false, field: 'previous_hash' },
      hash: { type: DataTypes.STRING(64), allowNull: false },
    },
    { sequelize, tableName: 'events', modelName: 'Event', timestamps: false },
  );
}
