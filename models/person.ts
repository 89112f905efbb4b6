import {
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** A person who may sign in; never a trial subject. */
export class Person extends Model<InferAttributes<Person>, InferCreationAttributes<Person>> {
  declare id: string;
  declare email: string;
  declare printedName: string;
  declare passwordHash: string | null;
  declare state: 'invited' | 'active' | 'disabled';
  declare isAdministrator: boolean;
  declare createdAt: Date;
}

export function initPerson(sequelize: Sequelize): void {
  Person.init(
    {
      id: { type: DataTypes.STRING(36), allowNull: false, primaryKey: true },
      email: { type: DataTypes.STRING(254), allowNull: false },
      printedName: { type: DataTypes.STRING(120), allowNull: false, field: 'printed_name' },
      passwordHash: { type: DataTypes.STRING(255), allowNull: true, field: 'password_hash' },
      state: { type: DataTypes.ENUM('invited', 'active', 'disabled'), allowNull: false },
      isAdministrator: { type: DataTypes.BOOLEAN, allowNull: false, field: 'is_administrator' },
      createdAt: { type: DataTypes.DATE(3), allowNull: false, field: 'created_at' },
    },
    { sequelize, tableName: 'people', modelName: 'Person', timestamps: false },
  );
}
