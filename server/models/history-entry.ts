import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** What happened: one act. Append-only; sealed by the database while the act commits. */
export class HistoryEntry extends Model<
  InferAttributes<HistoryEntry>,
  InferCreationAttributes<HistoryEntry>
> {
  declare id: string;
  declare at: Date;
  declare act: string;
  declare actorId: string;
  declare recordType: string;
  declare recordId: string;
  declare lotId: CreationOptional<string | null>;
  declare payload: string;

  static initialise(sequelize: Sequelize) {
    HistoryEntry.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, allowNull: false },
        at: { type: DataTypes.DATE(3), allowNull: false },
        act: { type: DataTypes.TEXT, allowNull: false },
        actorId: { type: DataTypes.TEXT, allowNull: false },
        recordType: { type: DataTypes.TEXT, allowNull: false },
        recordId: { type: DataTypes.TEXT, allowNull: false },
        lotId: DataTypes.UUID,
        payload: { type: DataTypes.TEXT, allowNull: false },
      },
      { sequelize, tableName: 'history_entries' },
    );
  }
}
