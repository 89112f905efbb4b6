import {
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** A site taking part in a trial. */
export class TrialSite extends Model<InferAttributes<TrialSite>, InferCreationAttributes<TrialSite>> {
  declare trialId: string;
  declare siteId: string;
  declare state: 'planned' | 'active' | 'suspended' | 'closed';
}

export function initTrialSite(sequelize: Sequelize): void {
  TrialSite.init(
    {
      trialId: { type: DataTypes.STRING(36), allowNull: false, field: 'trial_id', primaryKey: true },
      siteId: { type: DataTypes.STRING(36), allowNull: false, field: 'site_id', primaryKey: true },
      state: { type: DataTypes.ENUM('planned', 'active', 'suspended', 'closed'), allowNull: false },
    },
    { sequelize, tableName: 'trial_sites', modelName: 'TrialSite', timestamps: false },
  );
}
