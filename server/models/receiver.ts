import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';
import { type Part } from './part';
import { type ReceiverRevision } from './receiver-revision';

/** A radio that uses parts; what it tolerates stands in its revisions. */
export class Receiver extends Model<InferAttributes<Receiver>, InferCreationAttributes<Receiver>> {
  declare id: CreationOptional<string>;
  declare name: string;
  declare description: CreationOptional<string>;
  declare active: CreationOptional<boolean>;
  declare version: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;

  declare revisions?: NonAttribute<ReceiverRevision[]>;
  declare parts?: NonAttribute<Part[]>;

  static initialise(sequelize: Sequelize) {
    Receiver.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        name: { type: DataTypes.TEXT, allowNull: false },
        description: { type: DataTypes.TEXT, allowNull: true },
        active: { type: DataTypes.BOOLEAN, allowNull: true },
        version: { type: DataTypes.INTEGER, allowNull: true },
        createdAt: { type: DataTypes.DATE(3), allowNull: true },
      },
      { sequelize, tableName: 'receivers' },
    );
  }
}
