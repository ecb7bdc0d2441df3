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
import { type BandStripView } from '@shared/contract/lots';
import { type HoldMessage } from './hold-message';
import { type Lot } from './lot';
import { type Supplier } from './supplier';

/** A held lot and the conversation with its supplier. */
export class Hold extends Model<InferAttributes<Hold>, InferCreationAttributes<Hold>> {
  declare id: CreationOptional<string>;
  declare number: string;
  declare lotId: string;
  declare supplierId: string;
  declare dispositionId: string;
  declare analysisId: string;
  declare state: CreationOptional<'open' | 'acknowledged' | 'answered' | 'closed'>;
  declare reason: string;
  /** Sentences of the analysis and the picture as they stood when the hold was signed; the lot may move on. */
  declare finding: CreationOptional<string[]>;
  declare bandStrip: CreationOptional<z.infer<typeof BandStripView> | null>;
  declare acknowledgementDueAt: Date;
  declare answerDueAt: Date;
  declare acknowledgedAt: CreationOptional<Date | null>;
  declare answeredAt: CreationOptional<Date | null>;
  declare closedAt: CreationOptional<Date | null>;
  declare closingDispositionId: CreationOptional<string | null>;
  declare remindersSent: CreationOptional<number>;
  declare lastReminderAt: CreationOptional<Date | null>;
  declare version: CreationOptional<number>;
  declare openedAt: CreationOptional<Date>;

  declare lot?: NonAttribute<Lot>;
  declare supplier?: NonAttribute<Supplier | null>;
  declare messages?: NonAttribute<HoldMessage[]>;

  static initialise(sequelize: Sequelize) {
    Hold.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        number: { type: DataTypes.TEXT, allowNull: false },
        lotId: { type: DataTypes.UUID, allowNull: false },
        supplierId: { type: DataTypes.UUID, allowNull: false },
        dispositionId: { type: DataTypes.UUID, allowNull: false },
        analysisId: { type: DataTypes.UUID, allowNull: false },
        state: { type: DataTypes.TEXT, allowNull: true },
        reason: { type: DataTypes.TEXT, allowNull: false },
        finding: { type: DataTypes.JSONB, allowNull: true },
        bandStrip: DataTypes.JSONB,
        acknowledgementDueAt: { type: DataTypes.DATE(3), allowNull: false },
        answerDueAt: { type: DataTypes.DATE(3), allowNull: false },
        acknowledgedAt: DataTypes.DATE(3),
        answeredAt: DataTypes.DATE(3),
        closedAt: DataTypes.DATE(3),
        closingDispositionId: DataTypes.UUID,
        remindersSent: { type: DataTypes.INTEGER, allowNull: true },
        lastReminderAt: DataTypes.DATE(3),
        version: { type: DataTypes.INTEGER, allowNull: true },
        openedAt: { type: DataTypes.DATE(3), allowNull: true },
      },
      { sequelize, tableName: 'holds' },
    );
  }
}
