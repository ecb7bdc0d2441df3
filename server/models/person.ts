import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';
import { type Role } from '@shared/contract/common';
import { type PersonLink } from './person-link';
import { type Supplier } from './supplier';

/** Somebody who may sign in. */
export class Person extends Model<InferAttributes<Person>, InferCreationAttributes<Person>> {
  declare id: CreationOptional<string>;
  declare name: string;
  declare email: string;
  declare role: Role;
  declare supplierId: CreationOptional<string | null>;
  declare passwordHash: CreationOptional<string | null>;
  declare state: CreationOptional<'invited' | 'active' | 'disabled'>;
  declare sessionEpoch: CreationOptional<number>;
  declare failedSignIns: CreationOptional<number>;
  declare signInDelayedUntil: CreationOptional<Date | null>;
  declare failedSignings: CreationOptional<number>;
  declare signingLockedUntil: CreationOptional<Date | null>;
  declare mailChoice: CreationOptional<'at_once' | 'daily'>;
  declare tablePreferences: CreationOptional<Record<string, { columns: string[] }>>;
  declare lastSignInAt: CreationOptional<Date | null>;
  declare version: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;

  declare supplier?: NonAttribute<Supplier | null>;
  declare links?: NonAttribute<PersonLink[]>;

  static initialise(sequelize: Sequelize) {
    Person.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        name: { type: DataTypes.TEXT, allowNull: false },
        email: { type: DataTypes.TEXT, allowNull: false },
        role: { type: DataTypes.TEXT, allowNull: false },
        supplierId: DataTypes.UUID,
        passwordHash: DataTypes.TEXT,
        state: { type: DataTypes.TEXT, allowNull: true },
        sessionEpoch: { type: DataTypes.INTEGER, allowNull: true },
        failedSignIns: { type: DataTypes.INTEGER, allowNull: true },
        signInDelayedUntil: DataTypes.DATE(3),
        failedSignings: { type: DataTypes.INTEGER, allowNull: true },
        signingLockedUntil: DataTypes.DATE(3),
        mailChoice: { type: DataTypes.TEXT, allowNull: true },
        tablePreferences: { type: DataTypes.JSONB, allowNull: true },
        lastSignInAt: DataTypes.DATE(3),
        version: { type: DataTypes.INTEGER, allowNull: true },
        createdAt: { type: DataTypes.DATE(3), allowNull: true },
      },
      { sequelize, tableName: 'people' },
    );
  }
}
