import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';
import { type Person } from './person';

/** What a customer sent to approve a concession. */
export class ConcessionFile extends Model<
  InferAttributes<ConcessionFile>,
  InferCreationAttributes<ConcessionFile>
> {
  declare id: CreationOptional<string>;
  declare dispositionId: string;
  declare fileName: string;
  declare mediaType: string;
  declare byteCount: number;
  declare sha256: string;
  declare bytes: Buffer;
  declare sentBy: string;
  declare sentAt: CreationOptional<Date>;
  declare sender?: NonAttribute<Person>;

  static initialise(sequelize: Sequelize) {
    ConcessionFile.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        dispositionId: { type: DataTypes.UUID, allowNull: false },
        fileName: { type: DataTypes.TEXT, allowNull: false },
        mediaType: { type: DataTypes.TEXT, allowNull: false },
        byteCount: { type: DataTypes.INTEGER, allowNull: false },
        sha256: { type: DataTypes.TEXT, allowNull: false },
        bytes: { type: DataTypes.BLOB, allowNull: false },
        sentBy: { type: DataTypes.UUID, allowNull: false },
        sentAt: { type: DataTypes.DATE, allowNull: false, defaultValue: DataTypes.NOW },
      },
      { sequelize, tableName: 'concession_files' },
    );
  }
}
