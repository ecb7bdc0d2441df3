import { type Sequelize } from 'sequelize';
import { Supplier } from './supplier';
import { Person } from './person';
import { PersonLink } from './person-link';
import { SavedFilter } from './saved-filter';
import { Part } from './part';
import { PartRevision } from './part-revision';
import { Receiver } from './receiver';
import { ReceiverRevision } from './receiver-revision';
import { ReceiverPart } from './receiver-part';
import { Bench } from './bench';
import { BenchToken } from './bench-token';
import { Lot } from './lot';
import { LotReceiver } from './lot-receiver';
import { Upload } from './upload';
import { SavedMapping } from './saved-mapping';
import { Analysis } from './analysis';
import { Signature } from './signature';
import { Disposition } from './disposition';
import { Hold } from './hold';
import { HoldMessage } from './hold-message';
import { Attachment } from './attachment';
import { ConcessionFile } from './concession-file';
import { Mail } from './mail';
import { HistoryEntry } from './history-entry';
import { HistoryPersonal } from './history-personal';
import { HistorySeal } from './history-seal';
import { HistoryCheckpoint } from './history-checkpoint';
import { associate } from './associations';

const models = [
  Supplier,
  Person,
  PersonLink,
  SavedFilter,
  Part,
  PartRevision,
  Receiver,
  ReceiverRevision,
  ReceiverPart,
  Bench,
  BenchToken,
  Lot,
  LotReceiver,
  Upload,
  SavedMapping,
  Analysis,
  Signature,
  Disposition,
  Hold,
  HoldMessage,
  Attachment,
  ConcessionFile,
  Mail,
  HistoryEntry,
  HistoryPersonal,
  HistorySeal,
  HistoryCheckpoint,
];

export function initialiseModels(sequelize: Sequelize): void {
  for (const model of models) model.initialise(sequelize);
  associate();
}

export {
  Supplier,
  Person,
  PersonLink,
  SavedFilter,
  Part,
  PartRevision,
  Receiver,
  ReceiverRevision,
  ReceiverPart,
  Bench,
  BenchToken,
  Lot,
  LotReceiver,
  Upload,
  SavedMapping,
  Analysis,
  Signature,
  Disposition,
  Hold,
  HoldMessage,
  Attachment,
  ConcessionFile,
  Mail,
  HistoryEntry,
  HistoryPersonal,
  HistorySeal,
  HistoryCheckpoint,
};
