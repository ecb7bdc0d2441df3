import {
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** A receiver revision that a lot is judged by. */
export class LotReceiver extends Model<
  InferAttributes<LotReceiver>,
  InferCreationAttributes<LotReceiver>
> {
  declare lotId: string;
  declare receiverRevisionId: string;

  static initialise(sequelize: Sequelize) {
    LotReceiver.init(
      {
        lotId: { type: DataTypes.UUID, primaryKey: true, allowNull: false },
        receiverRevisionId: { type: DataTypes.UUID, primaryKey: true, allowNull: false },
      },
      { sequelize, tableName: 'lot_receivers' },
    );
  }
}
