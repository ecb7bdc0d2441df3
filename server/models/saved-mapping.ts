import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';
import { type Mapping } from '@shared/contract/uploads';

/** How files of a supplier with a given header are read. */
export class SavedMapping extends Model<
  InferAttributes<SavedMapping>,
  InferCreationAttributes<SavedMapping>
> {
  declare id: CreationOptional<string>;
  declare supplierId: string;
  declare headerHash: string;
  declare version: number;
  declare mapping: Mapping;
  declare savedBy: string;
  declare createdAt: CreationOptional<Date>;

  static initialise(sequelize: Sequelize) {
    SavedMapping.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        supplierId: { type: DataTypes.UUID, allowNull: false },
        headerHash: { type: DataTypes.TEXT, allowNull: false },
        version: { type: DataTypes.INTEGER, allowNull: false },
        mapping: { type: DataTypes.JSONB, allowNull: false },
        savedBy: { type: DataTypes.UUID, allowNull: false },
        createdAt: { type: DataTypes.DATE(3), allowNull: true },
      },
      { sequelize, tableName: 'saved_mappings' },
    );
  }
}
