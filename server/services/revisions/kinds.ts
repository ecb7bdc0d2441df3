import { Part, PartRevision, Receiver, ReceiverRevision } from '../../models';

/** Parts and receivers are revised in the same way; only the tables and the owner's column differ. */
export const revisedKinds = {
  part: {
    Owner: Part,
    Revision: PartRevision,
    ownerKey: 'partId',
    recordType: 'part_revision',
    what: 'This part',
  },
  receiver: {
    Owner: Receiver,
    Revision: ReceiverRevision,
    ownerKey: 'receiverId',
    recordType: 'receiver_revision',
    what: 'This receiver',
  },
} as const;
export type RevisedKind = keyof typeof revisedKinds;
