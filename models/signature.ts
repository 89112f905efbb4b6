import {
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** An electronic signature with the exact text that was signed and its digest. */
export class Signature extends Model<InferAttributes<Signature>, InferCreationAttributes<Signature>> {
  declare id: string;
  declare trialId: string;
  declare recommendationId: string | null;
  declare designVersionId: string | null;
  declare haltId: string | null;
  declare personId: string;
  declare printedName: string;
  declare decision: 'release' | 'return' | 'stop' | 'approve' | 'continue' | 'close-short';
  declare dose: string | null;
  declare reason: string | null;
  declare meaning: string;
  declare signedText: string;
  declare digest: string;
  declare signedAt: Date;
  declare isStanding: boolean;
}

export function initSignature(sequelize: Sequelize): void {
  Signature.init(
    {
      id: { type: DataTypes.STRING(36), allowNull: false, primaryKey: true },
      trialId: { type: DataTypes.STRING(36), allowNull: false, field: 'trial_id' },
      recommendationId: { type: DataTypes.STRING(36), allowNull: true, field: 'recommendation_id' },
      designVersionId: { type: DataTypes.STRING(36), allowNull: true, field: 'design_version_id' },
      haltId: { type: DataTypes.STRING(36), allowNull: true, field: 'halt_id' },
      personId: { type: DataTypes.STRING(36), allowNull: false, field: 'person_id' },
      printedName: { type: DataTypes.STRING(120), allowNull: false, field: 'printed_name' },
      decision: {
        type: DataTypes.ENUM('release', 'return', 'stop', 'approve', 'continue', 'close-short'),
        allowNull: false,
      },
      dose: { type: DataTypes.DECIMAL(20, 10), allowNull: true },
      reason: { type: DataTypes.STRING(2000), allowNull: true },
      meaning: { type: DataTypes.STRING(500), allowNull: false },
      signedText: { type: DataTypes.TEXT('long'), allowNull: false, field: 'signed_text' },
      digest: { type: DataTypes.STRING(64), allowNull: false },
      signedAt: { type: DataTypes.DATE(3), allowNull: false, field: 'signed_at' },
      isStanding: { type: DataTypes.BOOLEAN, allowNull: false, field: 'is_standing' },
    },
    { sequelize, tableName: 'signatures', modelName: 'Signature', timestamps: false },
  );
}
