import {
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** A halt of a trial; at most one stands. */
export class Halt extends Model<InferAttributes<Halt>, InferCreationAttributes<Halt>> {
  declare id: string;
  declare trialId: string;
  declare haltedBy: string | null;
  declare haltedAt: Date;
  declare reason: string;
  declare liftedAt: Date | null;
}

export function initHalt(sequelize: Sequelize): void {
  Halt.init(
    {
      id: { type: DataTypes.STRING(36), allowNull: false, primaryKey: true },
      trialId: { type: DataTypes.STRING(36), allowNull: false, field: 'trial_id' },
      haltedBy: { type: DataTypes.STRING(36), allowNull: true, field: 'halted_by' },
      haltedAt: { type: DataTypes.DATE(3), allowNull: false, field: 'halted_at' },
      reason: { type: DataTypes.STRING(2000), allowNull: false },
      liftedAt: { type: DataTypes.DATE(3), allowNull: true, field: 'lifted_at' },
    },
    { sequelize, tableName: 'halts', modelName: 'Halt', timestamps: false },
  );
}
