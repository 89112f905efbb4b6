import {
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** What an event says, apart from its link, with the salt of its digest. */
export class EventPayload extends Model<
  InferAttributes<EventPayload>,
  InferCreationAttributes<EventPayload>
> {
  declare eventId: string;
  declare schemaVersion: number;
  declare salt: string;
  declare payload: string;
}

export function initEventPayload(sequelize: Sequelize): void {
  EventPayload.init(
    {
      eventId: { type: DataTypes.STRING(36), allowNull: false, field: 'event_id', primaryKey: true },
      schemaVersion: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, field: 'schema_version' },
      salt: { type: DataTypes.STRING(32), allowNull: false },
      payload: { type: DataTypes.TEXT('long'), allowNull: false },
    },
    { sequelize, tableName: 'event_payloads', modelName: 'EventPayload', timestamps: false },
  );
}
