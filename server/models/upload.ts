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
import { type Mapping, type UploadWarning } from '@shared/contract/uploads';
import { type Bench } from './bench';
import { type Lot } from './lot';
import { type Person } from './person';

/** A file of readings as it came, and what became of its rows. */
export class Upload extends Model<InferAttributes<Upload>, InferCreationAttributes<Upload>> {
  declare id: CreationOptional<string>;
  declare number: CreationOptional<number>;
  declare lotId: string;
  declare benchId: CreationOptional<string | null>;
  declare benchUncertaintyPpm: CreationOptional<number | null>;
  declare benchInCalibration: CreationOptional<boolean | null>;
  declare fileName: string;
  declare byteCount: CreationOptional<string>;
  declare sha256: CreationOptional<string>;
  declare storedEncoding: CreationOptional<'identity' | 'gzip'>;
  declare state: CreationOptional<'queued' | 'running' | 'done' | 'failed' | 'withdrawn'>;
  declare stage: CreationOptional<'waiting' | 'reading' | 'analysing' | 'finished'>;
  declare mapping: CreationOptional<Mapping | null>;
  declare headings: CreationOptional<string[] | null>;
  declare rememberMapping: CreationOptional<boolean>;
  declare rowsInFile: CreationOptional<number>;
  declare rowsTaken: CreationOptional<number>;
  declare rowsRefused: CreationOptional<number>;
  declare unitsCount: CreationOptional<number>;
  declare bytesRead: CreationOptional<string>;
  declare rowsPerSecond: CreationOptional<number | null>;
  declare secondsLeft: CreationOptional<number | null>;
  declare failure: CreationOptional<{ code: string; message: string } | null>;
  declare warnings: CreationOptional<z.infer<typeof UploadWarning>[]>;
  declare readingsSha256: CreationOptional<string | null>;
  declare leaseToken: CreationOptional<string | null>;
  declare leaseUntil: CreationOptional<Date | null>;
  declare attempts: CreationOptional<number>;
  declare uploadedBy: CreationOptional<string | null>;
  declare benchTokenId: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare startedAt: CreationOptional<Date | null>;
  declare finishedAt: CreationOptional<Date | null>;
  declare withdrawnAt: CreationOptional<Date | null>;
  declare withdrawnBy: CreationOptional<string | null>;
  declare withdrawnReason: CreationOptional<string | null>;

  declare lot?: NonAttribute<Lot>;
  declare bench?: NonAttribute<Bench | null>;
  declare uploader?: NonAttribute<Person | null>;

  static initialise(sequelize: Sequelize) {
    Upload.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        number: { type: DataTypes.INTEGER, allowNull: true },
        lotId: { type: DataTypes.UUID, allowNull: false },
        benchId: DataTypes.UUID,
        benchUncertaintyPpm: DataTypes.DOUBLE,
        benchInCalibration: DataTypes.BOOLEAN,
        fileName: { type: DataTypes.TEXT, allowNull: false },
        byteCount: { type: DataTypes.BIGINT, allowNull: true },
        sha256: { type: DataTypes.TEXT, allowNull: true },
        storedEncoding: { type: DataTypes.TEXT, allowNull: true },
        state: { type: DataTypes.TEXT, allowNull: true },
        stage: { type: DataTypes.TEXT, allowNull: true },
        mapping: DataTypes.JSONB,
        headings: DataTypes.JSONB,
        rememberMapping: { type: DataTypes.BOOLEAN, allowNull: true },
        rowsInFile: { type: DataTypes.INTEGER, allowNull: true },
        rowsTaken: { type: DataTypes.INTEGER, allowNull: true },
        rowsRefused: { type: DataTypes.INTEGER, allowNull: true },
        unitsCount: { type: DataTypes.INTEGER, allowNull: true },
        bytesRead: { type: DataTypes.BIGINT, allowNull: true },
        rowsPerSecond: DataTypes.DOUBLE,
        secondsLeft: DataTypes.DOUBLE,
        failure: DataTypes.JSONB,
        warnings: { type: DataTypes.JSONB, allowNull: true },
        readingsSha256: DataTypes.TEXT,
        leaseToken: DataTypes.UUID,
        leaseUntil: DataTypes.DATE(3),
        attempts: { type: DataTypes.INTEGER, allowNull: true },
        uploadedBy: DataTypes.UUID,
        benchTokenId: DataTypes.UUID,
        createdAt: { type: DataTypes.DATE(3), allowNull: true },
        startedAt: DataTypes.DATE(3),
        finishedAt: DataTypes.DATE(3),
        withdrawnAt: DataTypes.DATE(3),
        withdrawnBy: DataTypes.UUID,
        withdrawnReason: DataTypes.TEXT,
      },
      { sequelize, tableName: 'uploads' },
    );
  }
}
