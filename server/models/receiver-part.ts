import {
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** Which receiver uses which part. */
export class ReceiverPart extends Model<
  InferAttributes<ReceiverPart>,
  InferCreationAttributes<ReceiverPart>
> {
  declare receiverId: string;
  declare partId: string;

  static initialise(sequelize: Sequelize) {
    ReceiverPart.init(
      {
        receiverId: { type: DataTypes.UUID, primaryKey: true, allowNull: false },
        partId: { type: DataTypes.UUID, primaryKey: true, allowNull: false },
      },
      { sequelize, tableName: 'receiver_parts' },
    );
  }
}
