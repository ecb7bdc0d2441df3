import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** An evidence file of a hold message. */
export class Attachment extends Model<
  InferAttributes<Attachment>,
  InferCreationAttributes<Attachment>
> {
  declare id: CreationOptional<string>;
  declare holdMessageId: string;
  declare fileName: string;
  declare mediaType: string;
  declare byteCount: number;
  declare sha256: string;
  declare bytes: Buffer;

  static initialise(sequelize: Sequelize) {
    Attachment.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        holdMessageId: { type: DataTypes.UUID, allowNull: false },
        fileName: { type: DataTypes.TEXT, allowNull: false },
        mediaType: { type: DataTypes.TEXT, allowNull: false },
        byteCount: { type: DataTypes.INTEGER, allowNull: false },
        sha256: { type: DataTypes.TEXT, allowNull: false },
        bytes: { type: DataTypes.BLOB, allowNull: false },
      },
      { sequelize, tableName: 'attachments' },
    );
  }
}
