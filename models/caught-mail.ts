import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** A mail caught by the local catcher (demo and test installations). */
export class CaughtMail extends Model<InferAttributes<CaughtMail>, InferCreationAttributes<CaughtMail>> {
  declare id: CreationOptional<number>;
  declare receivedAt: Date;
  declare envelopeTo: string;
  declare subject: string;
  declare messageId: string;
  declare text: string;
  declare html: string;
}

export function initCaughtMail(sequelize: Sequelize): void {
  CaughtMail.init(
    {
      id: { type: DataTypes.BIGINT, allowNull: false, primaryKey: true, autoIncrement: true },
      receivedAt: { type: DataTypes.DATE(6), allowNull: false, field: 'received_at' },
      envelopeTo: { type: DataTypes.TEXT('long'), allowNull: false, field: 'envelope_to' },
      subject: { type: DataTypes.STRING(500), allowNull: false },
      messageId: { type: DataTypes.STRING(200), allowNull: false, field: 'message_id' },
      text: { type: DataTypes.TEXT('long'), allowNull: false },
      html: { type: DataTypes.TEXT('long'), allowNull: false },
    },
    { sequelize, tableName: 'caught_mails', modelName: 'CaughtMail', timestamps: false },
  );
}
