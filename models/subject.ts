import {
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** One subject's slot in a cohort: reservation, dosing, outcome. */
export class Subject extends Model<InferAttributes<Subject>, InferCreationAttributes<Subject>> {
  declare id: string;
  declare trialId: string;
  declare cohortId: string;
  declare cohortSize: number;
  declare place: number | null;
  declare siteId: string;
  declare code: string;
  declare state: 'reserved' | 'dosed' | 'complete' | 'released' | 'cancelled';
  declare reservedBy: string;
  declare reservedAt: Date;
  declare releaseReason: string | null;
  declare dosedAt: Date | null;
  declare doseGiven: string | null;
  declare deviationReason: string | null;
  declare windowEndsAt: Date | null;
  declare dosingRecordedBy: string | null;
  declare dosingRecordedAt: Date | null;
  declare outcome: 'present' | 'absent' | 'not-evaluable' | null;
  declare onsetAt: Date | null;
  declare grade: number | null;
  declare outcomeRecordedBy: string | null;
  declare outcomeRecordedAt: Date | null;
  declare revision: number;
}

export function initSubject(sequelize: Sequelize): void {
  Subject.init(
    {
      id: { type: DataTypes.STRING(36), allowNull: false, primaryKey: true },
      trialId: { type: DataTypes.STRING(36), allowNull: false, field: 'trial_id' },
      cohortId: { type: DataTypes.STRING(36), allowNull: false, field: 'cohort_id' },
      cohortSize: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, field: 'cohort_size' },
      place: { type: DataTypes.INTEGER.UNSIGNED, allowNull: true },
      siteId: { type: DataTypes.STRING(36), allowNull: false, field: 'site_id' },
      code: { type: DataTypes.STRING(24), allowNull: false },
      state: {
        type: DataTypes.ENUM('reserved', 'dosed', 'complete', 'released', 'cancelled'),
        allowNull: false,
      },
      reservedBy: { type: DataTypes.STRING(36), allowNull: false, field: 'reserved_by' },
      reservedAt: { type: DataTypes.DATE(3), allowNull: false, field: 'reserved_at' },
      releaseReason: { type: DataTypes.STRING(500), allowNull: true, field: 'release_reason' },
      dosedAt: { type: DataTypes.DATE(3), allowNull: true, field: 'dosed_at' },
      doseGiven: { type: DataTypes.DECIMAL(20, 10), allowNull: true, field: 'dose_given' },
      deviationReason: { type: DataTypes.STRING(500), allowNull: true, field: 'deviation_reason' },
      windowEndsAt: { type: DataTypes.DATE(3), allowNull: true, field: 'window_ends_at' },
      dosingRecordedBy: { type: DataTypes.STRING(36), allowNull: true, field: 'dosing_recorded_by' },
      dosingRecordedAt: { type: DataTypes.DATE(3), allowNull: true, field: 'dosing_recorded_at' },
      outcome: { type: DataTypes.ENUM('present', 'absent', 'not-evaluable'), allowNull: true },
      onsetAt: { type: DataTypes.DATE(3), allowNull: true, field: 'onset_at' },
      grade: { type: DataTypes.INTEGER.UNSIGNED, allowNull: true },
      outcomeRecordedBy: { type: DataTypes.STRING(36), allowNull: true, field: 'outcome_recorded_by' },
      outcomeRecordedAt: { type: DataTypes.DATE(3), allowNull: true, field: 'outcome_recorded_at' },
      revision: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    },
    { sequelize, tableName: 'subjects', modelName: 'Subject', timestamps: false },
  );
}
