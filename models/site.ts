import {
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** A place where subjects are treated, with its time zone (IANA). */
export class Site extends Model<InferAttributes<Site>, InferCreationAttributes<Site>> {
  declare id: string;
  declare code: string;
  declare name: string;
  declare timeZone: string;
  declare createdAt: Date;
}

export function initSite(sequelize: Sequelize): void {
  Site.init(
    {
      id: { type: DataTypes.STRING(36), allowNull: false, primaryKey: true },
      code: { type: DataTypes.STRING(12), allowNull: false },
      name: { type: DataTypes.STRING(120), allowNull: false },
      timeZone: { type: DataTypes.STRING(64), allowNull: false, field: 'time_zone' },
      createdAt: { type: DataTypes.DATE(3), allowNull: false, field: 'created_at' },
    },
    { sequelize, tableName: 'sites', modelName: 'Site', timestamps: false },
  );
}
