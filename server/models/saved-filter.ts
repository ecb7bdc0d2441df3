import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** A named filter of a list. */
export class SavedFilter extends Model<
  InferAttributes<SavedFilter>,
  InferCreationAttributes<SavedFilter>
> {
  declare id: CreationOptional<string>;
  declare personId: string;
  declare list: string;
  declare name: string;
  declare query: string;
  declare sharedWithRole: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;

  static initialise(sequelize: Sequelize) {
    SavedFilter.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        personId: { type: DataTypes.UUID, allowNull: false },
        list: { type: DataTypes.TEXT, allowNull: false },
        name: { type: DataTypes.TEXT, allowNull: false },
        query: { type: DataTypes.TEXT, allowNull: false },
        sharedWithRole: DataTypes.TEXT,
        createdAt: { type: DataTypes.DATE(3), allowNull: true },
      },
      { sequelize, tableName: 'saved_filters' },
    );
  }
}
