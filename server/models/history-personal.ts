import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** Names and addresses that belong to an entry, kept outside the chain. */
export class HistoryPersonal extends Model<
  InferAttributes<HistoryPersonal>,
  InferCreationAttributes<HistoryPersonal>
> {
  declare entryId: string;
  declare before: CreationOptional<Record<string, unknown> | null>;
  declare after: CreationOptional<Record<string, unknown> | null>;

  static initialise(sequelize: Sequelize) {
    HistoryPersonal.init(
      {
        entryId: { type: DataTypes.UUID, primaryKey: true, allowNull: false },
        before: DataTypes.JSONB,
        after: DataTypes.JSONB,
      },
      { sequelize, tableName: 'history_personal' },
    );
  }
}
