import {
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** An account of the demo data, listed on the sign-in page. */
export class DemoAccount extends Model<InferAttributes<DemoAccount>, InferCreationAttributes<DemoAccount>> {
  declare personId: string;
  declare password: string;
  declare description: string;
  declare position: number;
}

export function initDemoAccount(sequelize: Sequelize): void {
  DemoAccount.init(
    {
      personId: { type: DataTypes.STRING(36), allowNull: false, field: 'person_id', primaryKey: true },
      password: { type: DataTypes.STRING(120), allowNull: false },
      description: { type: DataTypes.STRING(200), allowNull: false },
      position: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    },
    { sequelize, tableName: 'demo_accounts', modelName: 'DemoAccount', timestamps: false },
  );
}
