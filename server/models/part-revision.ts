import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';
import { type PartCriteria } from '@shared/contract/parts';
import { type Part } from './part';
import { type Person } from './person';
import { type Signature } from './signature';

/** What lots of a part are judged by from a day on. */
export class PartRevision extends Model<
  InferAttributes<PartRevision>,
  InferCreationAttributes<PartRevision>
> {
  declare id: CreationOptional<string>;
  declare partId: string;
  declare revision: string;
  declare state: CreationOptional<'draft' | 'approved' | 'withdrawn'>;
  declare effectiveFrom: CreationOptional<string | null>;
  declare changeNote: CreationOptional<string>;
  declare nominalFrequencyHz: string;
  declare criteria: PartCriteria;
  declare createdBy: string;
  declare approvalSignatureId: CreationOptional<string | null>;
  declare version: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;

  declare part?: NonAttribute<Part>;
  declare creator?: NonAttribute<Person>;
  declare approval?: NonAttribute<Signature | null>;

  static initialise(sequelize: Sequelize) {
    PartRevision.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        partId: { type: DataTypes.UUID, allowNull: false },
        revision: { type: DataTypes.TEXT, allowNull: false },
        state: { type: DataTypes.TEXT, allowNull: true },
        effectiveFrom: DataTypes.DATEONLY,
        changeNote: { type: DataTypes.TEXT, allowNull: true },
        nominalFrequencyHz: { type: DataTypes.DECIMAL, allowNull: false },
        criteria: { type: DataTypes.JSONB, allowNull: false },
        createdBy: { type: DataTypes.UUID, allowNull: false },
        approvalSignatureId: DataTypes.UUID,
        version: { type: DataTypes.INTEGER, allowNull: true },
        createdAt: { type: DataTypes.DATE(3), allowNull: true },
      },
      { sequelize, tableName: 'part_revisions' },
    );
  }
}
