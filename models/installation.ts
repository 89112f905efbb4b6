import {
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** The one row of this installation: its kind, the head of its chain, the test clock. */
export class Installation extends Model<
  InferAttributes<Installation>,
  InferCreationAttributes<Installation>
> {
  declare id: number;
  declare kind: 'production' | 'demo' | 'test';
  declare clockOffsetMilliseconds: number;
  declare version: number;
  declare chainSequence: number;
  declare chainHead: string;
  declare chainTime: Date | null;
  declare demoLoadedAt: Date | null;
}

export function initInstallation(sequelize: Sequelize): void {
  Installation.init(
    {
      id: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, primaryKey: true },
      kind: { type: DataTypes.ENUM('production', 'demo', 'test'), allowNull: false },
      clockOffsetMilliseconds: {
        type: DataTypes.BIGINT,
        allowNull: false,
        field: 'clock_offset_milliseconds',
      },
      version: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
      chainSequence: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, field: 'chain_sequence' },
      chainHead: { type: DataTypes.STRING(64), allowNull: false, field: 'chain_head' },
      chainTime: { type: DataTypes.DATE(3), allowNull: true, field: 'chain_time' },
      demoLoadedAt: { type: DataTypes.DATE(3), allowNull: true, field: 'demo_loaded_at' },
    },
    { sequelize, tableName: 'installation', modelName: 'Installation', timestamps: false },
  );
}
