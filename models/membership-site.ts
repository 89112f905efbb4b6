import {
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** A site a coordinator or investigator works at. */
export class MembershipSite extends Model<
  InferAttributes<MembershipSite>,
  InferCreationAttributes<MembershipSite>
> {
  declare membershipId: string;
  declare siteId: string;
}

export function initMembershipSite(sequelize: Sequelize): void {
  MembershipSite.init(
    {
      membershipId: {
        type: DataTypes.STRING(36),
        allowNull: false,
        field: 'membership_id',
        primaryKey: true,
      },
      siteId: { type: DataTypes.STRING(36), allowNull: false, field: 'site_id', primaryKey: true },
    },
    { sequelize, tableName: 'membership_sites', modelName: 'MembershipSite', timestamps: false },
  );
}
