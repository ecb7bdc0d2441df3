import { type Transaction } from 'sequelize';
import { sha256Hex } from '../../history/canonical';
import { type Actor } from '../../http/actor';
import { TooLarge } from '../../http/errors';
import { Attachment } from '../../models';
import { evidenceType } from './evidence-types';

export const greatestFileBytes = 10 * 1024 * 1024;
export const greatestFileCount = 5;
/** What one person may send in a day. */
export const greatestBytesPerDay = 250 * 1024 * 1024;

export interface EvidenceFile {
  fileName: string;
  bytes: Buffer;
}
export interface CheckedFile extends EvidenceFile {
  mediaType: string;
  sha256: string;
}

/** Only the last part of a path, without characters that steer a terminal or turn text round. */
export function safeFileName(name: string): string {
  const last = name.split(/[/\\]/).at(-1) ?? '';
  const clean = last
    .replace(/[\p{C}\p{Zl}\p{Zp}<>:"|?*]+/gu, '')
    .replace(/^\.+/, '')
    .trim();
  const dot = clean.lastIndexOf('.');
  const extension = dot > 0 ? clean.slice(dot, dot + 8) : '';
  const stem = (dot > 0 ? clean.slice(0, dot) : clean).slice(0, 100).trim();
  return `${stem || 'file'}${extension}`;
}

/** Before any row is written: one wrong file refuses the whole answer. */
export function checkEvidence(files: EvidenceFile[]): CheckedFile[] {
  return files.map(({ fileName, bytes }) => {
    const name = safeFileName(fileName);
    return {
      fileName: name,
      bytes,
      mediaType: evidenceType(name, bytes),
      sha256: sha256Hex(bytes),
    };
  });
}

export async function keepEvidence(
  transaction: Transaction,
  actor: Actor,
  holdMessageId: string,
  files: CheckedFile[],
): Promise<{ id: string; sha256: string; byteCount: number }[]> {
  if (files.length === 0) return [];
  await refuseOverQuota(transaction, actor, files);
  const rows: Attachment[] = [];
  for (const file of files) {
    // One by one: a bulk insert writes the bytes as text into one statement, which takes seconds for a large file.
    rows.push(
      await Attachment.create(
        {
          holdMessageId,
          fileName: file.fileName,
          mediaType: file.mediaType,
          byteCount: file.bytes.length,
          sha256: file.sha256,
          bytes: file.bytes,
        },
        { transaction },
      ),
    );
  }
  return rows.map(({ id, sha256, byteCount }) => ({ id, sha256, byteCount }));
}

async function refuseOverQuota(transaction: Transaction, actor: Actor, files: CheckedFile[]) {
  const [rows] = await Attachment.sequelize!.query(
    `SELECT coalesce(sum(a.byte_count), 0)::bigint AS total
     FROM attachments a JOIN hold_messages m ON m.id = a.hold_message_id
     WHERE m.author_id = :person AND m.created_at > now() - interval '1 day'`,
    { replacements: { person: actor.id }, transaction },
  );
  const sent = Number((rows as { total: string }[])[0]!.total);
  const coming = files.reduce((sum, file) => sum + file.bytes.length, 0);
  if (sent + coming > greatestBytesPerDay)
    throw new TooLarge(
      'You have sent as many files as are taken in a day. Send the rest tomorrow.',
      'attachment.quota',
    );
}
