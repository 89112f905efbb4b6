import {
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** A version of the design, as stored canonical text with its digest. */
export class DesignVersion extends Model<
  InferAttributes<DesignVersion>,
  InferCreationAttributes<DesignVersion>
> {
  declare id: string;
  declare trialId: string;
  declare number: number;
  declare state: 'draft' | 'submitted' | 'approved';
  declare design: string;
  declare digest: string;
  declare proposedBy: string;
  declare savedAt: Date;
  declare submittedAt: Date | null;
  declare approvedAt: Date | null;
  declare returnedReason: string | null;
}

export function initDesignVersion(sequelize: Sequelize): void {
  DesignVersion.init(
    {
      id: { type: DataTypes.STRING(36), allowNull: false, primaryKey: true },
      trialId: { type: DataTypes.STRING(36), allowNull: false, field: 'trial_id' },
      number: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
      state: { type: DataTypes.ENUM('draft', 'submitted', 'approved'), allowNull: false },
      design: { type: DataTypes.TEXT('long'), allowNull: false },
      digest: { type: DataTypes.STRING(64), allowNull: false },
      proposedBy: { type: DataTypes.STRING(36), allowNull: false, field: 'proposed_by' },
      savedAt: { type: DataTypes.DATE(3), allowNull: false, field: 'saved_at' },
      submittedAt: { type: DataTypes.DATE(3), allowNull: true, field: 'submitted_at' },
      approvedAt: { type: DataTypes.DATE(3), allowNull: true, field: 'approved_at' },
      returnedReason: { type: DataTypes.STRING(2000), allowNull: true, field: 'returned_reason' },
    },
    { sequelize, tableName: 'design_versions', modelName: 'DesignVersion', timestamps: false },
  );
}
