import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** Lets a bench upload by itself; only the hash is kept. */
export class BenchToken extends Model<
  InferAttributes<BenchToken>,
  InferCreationAttributes<BenchToken>
> {
  declare id: CreationOptional<string>;
  declare benchId: string;
  declare label: string;
  declare tokenHash: string;
  declare createdBy: string;
  declare lastUsedAt: CreationOptional<Date | null>;
  declare revokedAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;

  static initialise(sequelize: Sequelize) {
    BenchToken.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        benchId: { type: DataTypes.UUID, allowNull: false },
        label: { type: DataTypes.TEXT, allowNull: false },
        tokenHash: { type: DataTypes.TEXT, allowNull: false },
        createdBy: { type: DataTypes.UUID, allowNull: false },
        lastUsedAt: DataTypes.DATE(3),
        revokedAt: DataTypes.DATE(3),
        createdAt: { type: DataTypes.DATE(3), allowNull: true },
      },
      { sequelize, tableName: 'bench_tokens' },
    );
  }
}
