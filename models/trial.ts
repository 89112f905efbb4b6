import {
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** A trial. Its row is locked first and written by every command: version and head of its chain. */
export class Trial extends Model<InferAttributes<Trial>, InferCreationAttributes<Trial>> {
  declare id: string;
  declare code: string;
  declare title: string;
  declare state: 'draft' | 'in-review' | 'open' | 'halted' | 'closed' | 'locked';
  declare quorum: number;
  declare version: number;
  declare chainSequence: number;
  declare chainHead: string;
  declare chainTime: Date | null;
  declare createdAt: Date;
}

export function initTrial(sequelize: Sequelize): void {
  Trial.init(
    {
      id: { type: DataTypes.STRING(36), allowNull: false, primaryKey: true },
      code: { type: DataTypes.STRING(20), allowNull: false },
      title: { type: DataTypes.STRING(200), allowNull: false },
      state: {
        type: DataTypes.ENUM('draft', 'in-review', 'open', 'halted', 'closed', 'locked'),
        allowNull: false,
      },
      quorum: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
      version: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
      chainSequence: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, field: 'chain_sequence' },
      chainHead: { type: DataTypes.STRING(64), allowNull: false, field: 'chain_head' },
      chainTime: { type: DataTypes.DATE(3), allowNull: true, field: 'chain_time' },
      createdAt: { type: DataTypes.DATE(3), allowNull: false, field: 'created_at' },
    },
    { sequelize, tableName: 'trials', modelName: 'Trial', timestamps: false },
  );
}
