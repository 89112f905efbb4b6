import {
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** The one role of a person in a trial. */
export class Membership extends Model<InferAttributes<Membership>, InferCreationAttributes<Membership>> {
  declare id: string;
  declare trialId: string;
  declare personId: string;
  declare role: 'coordinator' | 'investigator' | 'reviewer' | 'statistician' | 'sponsor' | 'monitor';
  declare grantedAt: Date;
  declare endedAt: Date | null;
  declare hasRecordedData: boolean;
}

export function initMembership(sequelize: Sequelize): void {
  Membership.init(
    {
      id: { type: DataTypes.STRING(36), allowNull: false, primaryKey: true },
      trialId: { type: DataTypes.STRING(36), allowNull: false, field: 'trial_id' },
      personId: { type: DataTypes.STRING(36), allowNull: false, field: 'person_id' },
      role: {
        type: DataTypes.ENUM('coordinator', 'investigator', 'reviewer', 'statistician', 'sponsor', 'monitor'),
        allowNull: false,
      },
      grantedAt: { type: DataTypes.DATE(3), allowNull: false, field: 'granted_at' },
      endedAt: { type: DataTypes.DATE(3), allowNull: true, field: 'ended_at' },
      hasRecordedData: { type: DataTypes.BOOLEAN, allowNull: false, field: 'has_recorded_data' },
    },
    { sequelize, tableName: 'memberships', modelName: 'Membership', timestamps: false },
  );
}
