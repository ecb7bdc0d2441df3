import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';
import { type Attachment } from './attachment';
import { type Person } from './person';

/** One turn of the conversation on a hold. */
export class HoldMessage extends Model<
  InferAttributes<HoldMessage>,
  InferCreationAttributes<HoldMessage>
> {
  declare id: CreationOptional<string>;
  declare holdId: string;
  declare kind:
    'notice' | 'acknowledgement' | 'answer' | 'question' | 'reply' | 'reminder' | 'closing';
  declare authorId: CreationOptional<string | null>;
  declare side: 'house' | 'supplier' | 'system';
  declare text: CreationOptional<string>;
  declare containment: CreationOptional<string>;
  declare cause: CreationOptional<string>;
  declare correctiveAction: CreationOptional<string>;
  declare createdAt: CreationOptional<Date>;

  declare author?: NonAttribute<Person | null>;
  declare attachments?: NonAttribute<Attachment[]>;

  static initialise(sequelize: Sequelize) {
    HoldMessage.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        holdId: { type: DataTypes.UUID, allowNull: false },
        kind: { type: DataTypes.TEXT, allowNull: false },
        authorId: DataTypes.UUID,
        side: { type: DataTypes.TEXT, allowNull: false },
        text: { type: DataTypes.TEXT, allowNull: true },
        containment: { type: DataTypes.TEXT, allowNull: true },
        cause: { type: DataTypes.TEXT, allowNull: true },
        correctiveAction: { type: DataTypes.TEXT, allowNull: true },
        createdAt: { type: DataTypes.DATE(3), allowNull: true },
      },
      { sequelize, tableName: 'hold_messages' },
    );
  }
}
