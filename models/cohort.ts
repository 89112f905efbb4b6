import {
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** A cohort at its one released dose. */
export class Cohort extends Model<InferAttributes<Cohort>, InferCreationAttributes<Cohort>> {
  declare id: string;
  declare trialId: string;
  declare number: number;
  declare size: number;
  declare designVersionId: string;
  declare releaseId: string;
  declare dose: string;
  declare state: 'open' | 'under-review' | 'signed' | 'cancelled';
  declare isRecordsOnly: boolean;
  declare isClosedShort: boolean;
  declare openedAt: Date;
  declare completedAt: Date | null;
}

export function initCohort(sequelize: Sequelize): void {
  Cohort.init(
    {
      id: { type: DataTypes.STRING(36), allowNull: false, primaryKey: true },
      trialId: { type: DataTypes.STRING(36), allowNull: false, field: 'trial_id' },
      number: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
      size: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
      designVersionId: { type: DataTypes.STRING(36), allowNull: false, field: 'design_version_id' },
      releaseId: { type: DataTypes.STRING(36), allowNull: false, field: 'release_id' },
      dose: { type: DataTypes.DECIMAL(20, 10), allowNull: false },
      state: { type: DataTypes.ENUM('open', 'under-review', 'signed', 'cancelled'), allowNull: false },
      isRecordsOnly: { type: DataTypes.BOOLEAN, allowNull: false, field: 'is_records_only' },
      isClosedShort: { type: DataTypes.BOOLEAN, allowNull: false, field: 'is_closed_short' },
      openedAt: { type: DataTypes.DATE(3), allowNull: false, field: 'opened_at' },
      completedAt: { type: DataTypes.DATE(3), allowNull: true, field: 'completed_at' },
    },
    { sequelize, tableName: 'cohorts', modelName: 'Cohort', timestamps: false },
  );
}
