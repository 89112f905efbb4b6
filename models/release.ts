import {
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** A dose released by the quorum; never above the recommended one (foreign key and check). */
export class Release extends Model<InferAttributes<Release>, InferCreationAttributes<Release>> {
  declare id: string;
  declare trialId: string;
  declare cohortNumber: number;
  declare recommendationId: string;
  declare recommendedDose: string;
  declare dose: string;
  declare releasedAt: Date;
}

export function initRelease(sequelize: Sequelize): void {
  Release.init(
    {
      id: { type: DataTypes.STRING(36), allowNull: false, primaryKey: true },
      trialId: { type: DataTypes.STRING(36), allowNull: false, field: 'trial_id' },
      cohortNumber: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, field: 'cohort_number' },
      recommendationId: { type: DataTypes.STRING(36), allowNull: false, field: 'recommendation_id' },
      recommendedDose: { type: DataTypes.DECIMAL(20, 10), allowNull: false, field: 'recommended_dose' },
      dose: { type: DataTypes.DECIMAL(20, 10), allowNull: false },
      releasedAt: { type: DataTypes.DATE(3), allowNull: false, field: 'released_at' },
    },
    { sequelize, tableName: 'releases', modelName: 'Release', timestamps: false },
  );
}
