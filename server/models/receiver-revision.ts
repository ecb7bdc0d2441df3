import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';
import { type ReceiverCriteria } from '@shared/contract/receivers';
import { type Person } from './person';
import { type Receiver } from './receiver';
import { type Signature } from './signature';

/** What a receiver tolerates from a day on. */
export class ReceiverRevision extends Model<
  InferAttributes<ReceiverRevision>,
  InferCreationAttributes<ReceiverRevision>
> {
  declare id: CreationOptional<string>;
  declare receiverId: string;
  declare revision: string;
  declare state: CreationOptional<'draft' | 'approved' | 'withdrawn'>;
  declare effectiveFrom: CreationOptional<string | null>;
  declare changeNote: CreationOptional<string>;
  declare criteria: ReceiverCriteria;
  declare createdBy: string;
  declare approvalSignatureId: CreationOptional<string | null>;
  declare version: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;

  declare receiver?: NonAttribute<Receiver>;
  declare creator?: NonAttribute<Person>;
  declare approval?: NonAttribute<Signature | null>;

  static initialise(sequelize: Sequelize) {
    ReceiverRevision.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        receiverId: { type: DataTypes.UUID, allowNull: false },
        revision: { type: DataTypes.TEXT, allowNull: false },
        state: { type: DataTypes.TEXT, allowNull: true },
        effectiveFrom: DataTypes.DATEONLY,
        changeNote: { type: DataTypes.TEXT, allowNull: true },
        criteria: { type: DataTypes.JSONB, allowNull: false },
        createdBy: { type: DataTypes.UUID, allowNull: false },
        approvalSignatureId: DataTypes.UUID,
        version: { type: DataTypes.INTEGER, allowNull: true },
        createdAt: { type: DataTypes.DATE(3), allowNull: true },
      },
      { sequelize, tableName: 'receiver_revisions' },
    );
  }
}
