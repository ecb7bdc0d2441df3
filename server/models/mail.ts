import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';
import { type MailPicture, type MailAttempt } from '../mail/message';

/** One mail of the outbox, written in the transaction of the act that it tells of. */
export class Mail extends Model<InferAttributes<Mail>, InferCreationAttributes<Mail>> {
  declare id: CreationOptional<string>;
  declare messageId: string;
  declare inReplyTo: CreationOptional<string | null>;
  declare kind: string;
  declare urgency: CreationOptional<'at_once' | 'digest'>;
  declare personId: string;
  declare toName: string;
  declare toEmail: string;
  declare subject: string;
  declare textBody: string;
  declare htmlBody: string;
  declare pictures: CreationOptional<MailPicture[]>;
  declare why: string;
  declare secret: CreationOptional<boolean>;
  declare holdId: CreationOptional<string | null>;
  declare lotId: CreationOptional<string | null>;
  declare state: CreationOptional<'queued' | 'accepted' | 'refused' | 'dead'>;
  declare tries: CreationOptional<number>;
  declare uncertainTries: CreationOptional<number>;
  declare nextTryAt: CreationOptional<Date | null>;
  declare leaseToken: CreationOptional<string | null>;
  declare leaseUntil: CreationOptional<Date | null>;
  declare lastAnswer: CreationOptional<string>;
  declare attempts: CreationOptional<MailAttempt[]>;
  declare digestMailId: CreationOptional<string | null>;
  declare acceptedAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;

  static initialise(sequelize: Sequelize) {
    Mail.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        messageId: { type: DataTypes.TEXT, allowNull: false },
        inReplyTo: DataTypes.TEXT,
        kind: { type: DataTypes.TEXT, allowNull: false },
        urgency: { type: DataTypes.TEXT, allowNull: true },
        personId: { type: DataTypes.UUID, allowNull: false },
        toName: { type: DataTypes.TEXT, allowNull: false },
        toEmail: { type: DataTypes.TEXT, allowNull: false },
        subject: { type: DataTypes.TEXT, allowNull: false },
        textBody: { type: DataTypes.TEXT, allowNull: false },
        htmlBody: { type: DataTypes.TEXT, allowNull: false },
        pictures: { type: DataTypes.JSONB, allowNull: true },
        why: { type: DataTypes.TEXT, allowNull: false },
        secret: { type: DataTypes.BOOLEAN, allowNull: true },
        holdId: DataTypes.UUID,
        lotId: DataTypes.UUID,
        state: { type: DataTypes.TEXT, allowNull: true },
        tries: { type: DataTypes.INTEGER, allowNull: true },
        uncertainTries: { type: DataTypes.INTEGER, allowNull: true },
        nextTryAt: DataTypes.DATE(3),
        leaseToken: DataTypes.UUID,
        leaseUntil: DataTypes.DATE(3),
        lastAnswer: { type: DataTypes.TEXT, allowNull: true },
        attempts: { type: DataTypes.JSONB, allowNull: true },
        digestMailId: DataTypes.UUID,
        acceptedAt: DataTypes.DATE(3),
        createdAt: { type: DataTypes.DATE(3), allowNull: true },
      },
      { sequelize, tableName: 'mails' },
    );
  }
}
