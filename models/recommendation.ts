import {
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** A computed recommendation with everything it was computed from, as stored canonical text. */
export class Recommendation extends Model<
  InferAttributes<Recommendation>,
  InferCreationAttributes<Recommendation>
> {
  declare id: string;
  declare trialId: string;
  declare number: number;
  declare revision: number;
  declare designVersionId: string;
  declare outcome: 'dose' | 'stop';
  declare dose: string | null;
  declare closedFrom: string | null;
  declare state: 'awaiting' | 'released' | 'stopped' | 'returned' | 'superseded' | 'overtaken';
  declare record: string;
  declare digest: string;
  declare softwareVersion: string;
  declare computedAt: Date;
}

export function initRecommendation(sequelize: Sequelize): void {
  Recommendation.init(
    {
      id: { type: DataTypes.STRING(36), allowNull: false, primaryKey: true },
      trialId: { type: DataTypes.STRING(36), allowNull: false, field: 'trial_id' },
      number: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
      revision: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
      designVersionId: { type: DataTypes.STRING(36), allowNull: false, field: 'design_version_id' },
      outcome: { type: DataTypes.ENUM('dose', 'stop'), allowNull: false },
      dose: { type: DataTypes.DECIMAL(20, 10), allowNull: true },
      closedFrom: { type: DataTypes.DECIMAL(20, 10), allowNull: true, field: 'closed_from' },
      state: {
        type: DataTypes.ENUM('awaiting', 'released', 'stopped', 'returned', 'superseded', 'overtaken'),
        allowNull: false,
      },
      record: { type: DataTypes.TEXT('long'), allowNull: false },
      digest: { type: DataTypes.STRING(64), allowNull: false },
      softwareVersion: { type: DataTypes.STRING(60), allowNull: false, field: 'software_version' },
      computedAt: { type: DataTypes.DATE(3), allowNull: false, field: 'computed_at' },
    },
    { sequelize, tableName: 'recommendations', modelName: 'Recommendation', timestamps: false },
  );
}
