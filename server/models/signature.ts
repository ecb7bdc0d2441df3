import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';
import { type Role } from '@shared/contract/common';

/** A signature: who, when, with which meaning and reason, on exactly which content. */
export class Signature extends Model<
  InferAttributes<Signature>,
  InferCreationAttributes<Signature>
> {
  declare id: CreationOptional<string>;
  declare personId: string;
  declare printedName: string;
  declare role: Role;
  declare meaning: string;
  declare reason: string;
  declare recordType: string;
  declare recordId: string;
  declare recordVersion: number;
  declare contentText: string;
  declare contentHash: string;
  declare signedAt: Date;
  declare zone: string;

  static initialise(sequelize: Sequelize) {
    Signature.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        personId: { type: DataTypes.UUID, allowNull: false },
        printedName: { type: DataTypes.TEXT, allowNull: false },
        role: { type: DataTypes.TEXT, allowNull: false },
        meaning: { type: DataTypes.TEXT, allowNull: false },
        reason: { type: DataTypes.TEXT, allowNull: false },
        recordType: { type: DataTypes.TEXT, allowNull: false },
        recordId: { type: DataTypes.UUID, allowNull: false },
        recordVersion: { type: DataTypes.INTEGER, allowNull: false },
        contentText: { type: DataTypes.TEXT, allowNull: false },
        contentHash: { type: DataTypes.TEXT, allowNull: false },
        signedAt: { type: DataTypes.DATE(3), allowNull: false },
        zone: { type: DataTypes.TEXT, allowNull: false },
      },
      { sequelize, tableName: 'signatures' },
    );
  }
}
