import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** A measuring bench: its counter, its uncertainty and its calibration. */
export class Bench extends Model<InferAttributes<Bench>, InferCreationAttributes<Bench>> {
  declare id: CreationOptional<string>;
  declare name: string;
  declare counter: string;
  declare location: CreationOptional<string>;
  declare expandedUncertaintyPpm: number;
  declare coverageFactor: CreationOptional<number>;
  declare calibrationDue: string;
  declare calibrationReference: CreationOptional<string>;
  declare chamberLowC: CreationOptional<number | null>;
  declare chamberHighC: CreationOptional<number | null>;
  declare usual: CreationOptional<boolean>;
  declare active: CreationOptional<boolean>;
  declare version: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;

  static initialise(sequelize: Sequelize) {
    Bench.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        name: { type: DataTypes.TEXT, allowNull: false },
        counter: { type: DataTypes.TEXT, allowNull: false },
        location: { type: DataTypes.TEXT, allowNull: true },
        expandedUncertaintyPpm: { type: DataTypes.DOUBLE, allowNull: false },
        coverageFactor: { type: DataTypes.DOUBLE, allowNull: true },
        calibrationDue: { type: DataTypes.DATEONLY, allowNull: false },
        calibrationReference: { type: DataTypes.TEXT, allowNull: true },
        chamberLowC: DataTypes.DOUBLE,
        chamberHighC: DataTypes.DOUBLE,
        usual: { type: DataTypes.BOOLEAN, allowNull: true },
        active: { type: DataTypes.BOOLEAN, allowNull: true },
        version: { type: DataTypes.INTEGER, allowNull: true },
        createdAt: { type: DataTypes.DATE(3), allowNull: true },
      },
      { sequelize, tableName: 'benches' },
    );
  }
}
