import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';
import { type z } from 'zod';
import { type Decision, type Concession } from '@shared/contract/dispositions';
import { type Analysis } from './analysis';
import { type Lot } from './lot';
import { type Person } from './person';

/** A signed decision on a lot. */
export class Disposition extends Model<
  InferAttributes<Disposition>,
  InferCreationAttributes<Disposition>
> {
  declare id: CreationOptional<string>;
  declare lotId: string;
  declare number: number;
  declare dataVersion: number;
  declare analysisId: string;
  declare decision: Decision;
  declare reason: string;
  declare state: 'awaiting_second' | 'in_force' | 'superseded' | 'refused' | 'overtaken';
  declare treatment: CreationOptional<'return_to_supplier' | 'scrap' | null>;
  declare concession: CreationOptional<z.infer<typeof Concession> | null>;
  declare correction: CreationOptional<string>;
  declare contentHash: string;
  declare signedBy: string;
  declare signedAt: Date;

  declare lot?: NonAttribute<Lot>;
  declare analysis?: NonAttribute<Analysis>;
  declare signer?: NonAttribute<Person>;

  static initialise(sequelize: Sequelize) {
    Disposition.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        lotId: { type: DataTypes.UUID, allowNull: false },
        number: { type: DataTypes.INTEGER, allowNull: false },
        dataVersion: { type: DataTypes.INTEGER, allowNull: false },
        analysisId: { type: DataTypes.UUID, allowNull: false },
        decision: { type: DataTypes.TEXT, allowNull: false },
        reason: { type: DataTypes.TEXT, allowNull: false },
        state: { type: DataTypes.TEXT, allowNull: false },
        treatment: DataTypes.TEXT,
        concession: DataTypes.JSONB,
        correction: { type: DataTypes.TEXT, allowNull: true },
        contentHash: { type: DataTypes.TEXT, allowNull: false },
        signedBy: { type: DataTypes.UUID, allowNull: false },
        signedAt: { type: DataTypes.DATE(3), allowNull: false },
      },
      { sequelize, tableName: 'dispositions' },
    );
  }
}
