import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** The seal of an entry: its place in the chain and its hash. */
export class HistorySeal extends Model<
  InferAttributes<HistorySeal>,
  InferCreationAttributes<HistorySeal>
> {
  declare sequence: string;
  declare entryId: string;
  declare previousHash: string;
  declare hash: string;
  declare sealedAt: CreationOptional<Date>;

  static initialise(sequelize: Sequelize) {
    HistorySeal.init(
      {
        sequence: { type: DataTypes.BIGINT, primaryKey: true, allowNull: false },
        entryId: { type: DataTypes.UUID, allowNull: false },
        previousHash: { type: DataTypes.TEXT, allowNull: false },
        hash: { type: DataTypes.TEXT, allowNull: false },
        sealedAt: { type: DataTypes.DATE(3), allowNull: true },
      },
      { sequelize, tableName: 'history_seals' },
    );
  }
}
