import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** Count and head of the chain at a time, signed by a key outside the database. */
export class HistoryCheckpoint extends Model<
  InferAttributes<HistoryCheckpoint>,
  InferCreationAttributes<HistoryCheckpoint>
> {
  declare id: CreationOptional<string>;
  declare count: string;
  declare head: string;
  declare at: Date;
  declare signature: string;
  declare publicKey: string;

  static initialise(sequelize: Sequelize) {
    HistoryCheckpoint.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        count: { type: DataTypes.BIGINT, allowNull: false },
        head: { type: DataTypes.TEXT, allowNull: false },
        at: { type: DataTypes.DATE(3), allowNull: false },
        signature: { type: DataTypes.TEXT, allowNull: false },
        publicKey: { type: DataTypes.TEXT, allowNull: false },
      },
      { sequelize, tableName: 'history_checkpoints' },
    );
  }
}
