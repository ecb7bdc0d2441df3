import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';
import { type z } from 'zod';
import { type LotState, type BandStripView } from '@shared/contract/lots';
import { type Disposition } from './disposition';
import { type Part } from './part';
import { type PartRevision } from './part-revision';
import { type Person } from './person';
import { type ReceiverRevision } from './receiver-revision';
import { type Supplier } from './supplier';
import { type Upload } from './upload';

/** Units of one part submitted together for one decision. */
export class Lot extends Model<InferAttributes<Lot>, InferCreationAttributes<Lot>> {
  declare id: CreationOptional<string>;
  declare lotNumber: string;
  declare supplierId: string;
  declare partId: string;
  declare partRevisionId: string;
  declare dateCode: CreationOptional<string>;
  declare purchaseOrder: CreationOptional<string>;
  declare lotSize: number;
  declare receivedOn: string;
  declare state: CreationOptional<LotState>;
  declare stateSince: CreationOptional<Date>;
  declare severity: CreationOptional<'normal' | 'tightened' | 'reduced' | 'discontinued'>;
  declare severityReasons: CreationOptional<string[]>;
  declare inspectAll: CreationOptional<boolean>;
  declare parentLotId: CreationOptional<string | null>;
  declare unitsPlanned: number;
  declare unitsMeasured: CreationOptional<number>;
  declare unitsLackingTemperatures: CreationOptional<number>;
  declare unitsLackingResistance: CreationOptional<number>;
  declare beyondCount: CreationOptional<number | null>;
  declare finding: CreationOptional<'accept' | 'hold' | null>;
  declare planMet: CreationOptional<boolean | null>;
  declare bandStrip: CreationOptional<z.infer<typeof BandStripView> | null>;
  declare currentAnalysisId: CreationOptional<string | null>;
  declare dataVersion: CreationOptional<number>;
  declare registeredBy: string;
  declare version: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;

  declare part?: NonAttribute<Part>;
  declare partRevision?: NonAttribute<PartRevision>;
  declare supplier?: NonAttribute<Supplier | null>;
  declare registrar?: NonAttribute<Person>;
  declare parent?: NonAttribute<Lot | null>;
  declare subLots?: NonAttribute<Lot[]>;
  declare receiverRevisions?: NonAttribute<ReceiverRevision[]>;
  declare uploads?: NonAttribute<Upload[]>;
  declare dispositions?: NonAttribute<Disposition[]>;

  static initialise(sequelize: Sequelize) {
    Lot.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        lotNumber: { type: DataTypes.TEXT, allowNull: false },
        supplierId: { type: DataTypes.UUID, allowNull: false },
        partId: { type: DataTypes.UUID, allowNull: false },
        partRevisionId: { type: DataTypes.UUID, allowNull: false },
        dateCode: { type: DataTypes.TEXT, allowNull: true },
        purchaseOrder: { type: DataTypes.TEXT, allowNull: true },
        lotSize: { type: DataTypes.INTEGER, allowNull: false },
        receivedOn: { type: DataTypes.DATEONLY, allowNull: false },
        state: { type: DataTypes.TEXT, allowNull: true },
        stateSince: { type: DataTypes.DATE(3), allowNull: true },
        severity: { type: DataTypes.TEXT, allowNull: true },
        severityReasons: { type: DataTypes.JSONB, allowNull: true },
        inspectAll: { type: DataTypes.BOOLEAN, allowNull: true },
        parentLotId: DataTypes.UUID,
        unitsPlanned: { type: DataTypes.INTEGER, allowNull: false },
        unitsMeasured: { type: DataTypes.INTEGER, allowNull: true },
        unitsLackingTemperatures: { type: DataTypes.INTEGER, allowNull: true },
        unitsLackingResistance: { type: DataTypes.INTEGER, allowNull: true },
        beyondCount: DataTypes.INTEGER,
        finding: DataTypes.TEXT,
        planMet: DataTypes.BOOLEAN,
        bandStrip: DataTypes.JSONB,
        currentAnalysisId: DataTypes.UUID,
        dataVersion: { type: DataTypes.INTEGER, allowNull: true },
        registeredBy: { type: DataTypes.UUID, allowNull: false },
        version: { type: DataTypes.INTEGER, allowNull: true },
        createdAt: { type: DataTypes.DATE(3), allowNull: true },
      },
      { sequelize, tableName: 'lots' },
    );
  }
}
