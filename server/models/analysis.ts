import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';
import { type AnalysisCriteria } from '@shared/analysis/criteria';

/** What the computation made of one set of readings under one set of criteria. */
export class Analysis extends Model<InferAttributes<Analysis>, InferCreationAttributes<Analysis>> {
  declare id: CreationOptional<string>;
  declare lotId: string;
  declare version: number;
  declare dataVersion: number;
  declare methodVersion: string;
  declare inputHash: string;
  declare criteriaHash: string;
  declare criteria: AnalysisCriteria;
  declare resultText: string;
  declare resultHash: string;
  declare frozenAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;

  static initialise(sequelize: Sequelize) {
    Analysis.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        lotId: { type: DataTypes.UUID, allowNull: false },
        version: { type: DataTypes.INTEGER, allowNull: false },
        dataVersion: { type: DataTypes.INTEGER, allowNull: false },
        methodVersion: { type: DataTypes.TEXT, allowNull: false },
        inputHash: { type: DataTypes.TEXT, allowNull: false },
        criteriaHash: { type: DataTypes.TEXT, allowNull: false },
        criteria: { type: DataTypes.JSONB, allowNull: false },
        resultText: { type: DataTypes.TEXT, allowNull: false },
        resultHash: { type: DataTypes.TEXT, allowNull: false },
        frozenAt: DataTypes.DATE(3),
        createdAt: { type: DataTypes.DATE(3), allowNull: true },
      },
      { sequelize, tableName: 'analyses' },
    );
  }
}
