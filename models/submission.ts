import {
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** A submission already applied, with the result it got. */
export class Submission extends Model<InferAttributes<Submission>, InferCreationAttributes<Submission>> {
  declare personId: string;
  declare submissionKey: string;
  declare command: string;
  declare result: string;
  declare createdAt: Date;
}

export function initSubmission(sequelize: Sequelize): void {
  Submission.init(
    {
      personId: { type: DataTypes.STRING(36), allowNull: false, field: 'person_id', primaryKey: true },
      submissionKey: {
        type: DataTypes.STRING(36),
        allowNull: false,
        field: 'submission_key',
        primaryKey: true,
      },
      command: { type: DataTypes.STRING(60), allowNull: false },
      result: { type: DataTypes.TEXT('long'), allowNull: false },
      createdAt: { type: DataTypes.DATE(3), allowNull: false, field: 'created_at' },
    },
    { sequelize, tableName: 'submissions', modelName: 'Submission', timestamps: false },
  );
}
