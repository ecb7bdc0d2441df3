import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';
import { type DeviceKind } from '@shared/contract/parts';
import { type PartRevision } from './part-revision';
import { type Receiver } from './receiver';

/** A part number; what it must meet stands in its revisions. */
export class Part extends Model<InferAttributes<Part>, InferCreationAttributes<Part>> {
  declare id: CreationOptional<string>;
  declare partNumber: string;
  declare deviceKind: DeviceKind;
  declare description: CreationOptional<string>;
  declare active: CreationOptional<boolean>;
  declare version: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;

  declare revisions?: NonAttribute<PartRevision[]>;
  declare receivers?: NonAttribute<Receiver[]>;

  static initialise(sequelize: Sequelize) {
    Part.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        partNumber: { type: DataTypes.TEXT, allowNull: false },
        deviceKind: { type: DataTypes.TEXT, allowNull: false },
        description: { type: DataTypes.TEXT, allowNull: true },
        active: { type: DataTypes.BOOLEAN, allowNull: true },
        version: { type: DataTypes.INTEGER, allowNull: true },
        createdAt: { type: DataTypes.DATE(3), allowNull: true },
      },
      { sequelize, tableName: 'parts' },
    );
  }
}
