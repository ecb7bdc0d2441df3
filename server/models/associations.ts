import { Attachment } from './attachment';
import { ConcessionFile } from './concession-file';
import { Bench } from './bench';
import { Disposition } from './disposition';
import { Analysis } from './analysis';
import { Hold } from './hold';
import { HoldMessage } from './hold-message';
import { Lot } from './lot';
import { LotReceiver } from './lot-receiver';
import { Part } from './part';
import { PartRevision } from './part-revision';
import { Person } from './person';
import { PersonLink } from './person-link';
import { Receiver } from './receiver';
import { ReceiverPart } from './receiver-part';
import { ReceiverRevision } from './receiver-revision';
import { Signature } from './signature';
import { Supplier } from './supplier';
import { Upload } from './upload';

/** Who belongs to whom. Names are the ones used in `include`. */
export function associate(): void {
  Person.belongsTo(Supplier, { as: 'supplier', foreignKey: 'supplierId' });
  Supplier.hasMany(Person, { as: 'contacts', foreignKey: 'supplierId' });
  Person.hasMany(PersonLink, { as: 'links', foreignKey: 'personId' });

  Part.hasMany(PartRevision, { as: 'revisions', foreignKey: 'partId' });
  PartRevision.belongsTo(Part, { as: 'part', foreignKey: 'partId' });
  PartRevision.belongsTo(Person, { as: 'creator', foreignKey: 'createdBy' });
  PartRevision.belongsTo(Signature, { as: 'approval', foreignKey: 'approvalSignatureId' });
  Receiver.hasMany(ReceiverRevision, { as: 'revisions', foreignKey: 'receiverId' });
  ReceiverRevision.belongsTo(Receiver, { as: 'receiver', foreignKey: 'receiverId' });
  ReceiverRevision.belongsTo(Person, { as: 'creator', foreignKey: 'createdBy' });
  ReceiverRevision.belongsTo(Signature, { as: 'approval', foreignKey: 'approvalSignatureId' });
  Part.belongsToMany(Receiver, {
    as: 'receivers',
    through: ReceiverPart,
    foreignKey: 'partId',
    otherKey: 'receiverId',
  });
  Receiver.belongsToMany(Part, {
    as: 'parts',
    through: ReceiverPart,
    foreignKey: 'receiverId',
    otherKey: 'partId',
  });

  Lot.belongsTo(Part, { as: 'part', foreignKey: 'partId' });
  Lot.belongsTo(PartRevision, { as: 'partRevision', foreignKey: 'partRevisionId' });
  Lot.belongsTo(Supplier, { as: 'supplier', foreignKey: 'supplierId' });
  Lot.belongsTo(Person, { as: 'registrar', foreignKey: 'registeredBy' });
  Lot.belongsTo(Lot, { as: 'parent', foreignKey: 'parentLotId' });
  Lot.hasMany(Lot, { as: 'subLots', foreignKey: 'parentLotId' });
  Lot.belongsToMany(ReceiverRevision, {
    as: 'receiverRevisions',
    through: LotReceiver,
    foreignKey: 'lotId',
    otherKey: 'receiverRevisionId',
  });
  Lot.hasMany(Upload, { as: 'uploads', foreignKey: 'lotId' });
  Upload.belongsTo(Lot, { as: 'lot', foreignKey: 'lotId' });
  Upload.belongsTo(Bench, { as: 'bench', foreignKey: 'benchId' });
  Upload.belongsTo(Person, { as: 'uploader', foreignKey: 'uploadedBy' });

  Lot.hasMany(Disposition, { as: 'dispositions', foreignKey: 'lotId' });
  Disposition.belongsTo(Lot, { as: 'lot', foreignKey: 'lotId' });
  Disposition.belongsTo(Analysis, { as: 'analysis', foreignKey: 'analysisId' });
  Disposition.belongsTo(Person, { as: 'signer', foreignKey: 'signedBy' });

  ConcessionFile.belongsTo(Person, { as: 'sender', foreignKey: 'sentBy' });

  Hold.belongsTo(Lot, { as: 'lot', foreignKey: 'lotId' });
  Hold.belongsTo(Supplier, { as: 'supplier', foreignKey: 'supplierId' });
  Hold.hasMany(HoldMessage, { as: 'messages', foreignKey: 'holdId' });
  HoldMessage.belongsTo(Person, { as: 'author', foreignKey: 'authorId' });
  HoldMessage.hasMany(Attachment, { as: 'attachments', foreignKey: 'holdMessageId' });
}
