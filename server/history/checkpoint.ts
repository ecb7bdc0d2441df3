import {
  createPrivateKey,
  createPublicKey,
  generateKeyPairSync,
  sign,
  type KeyObject,
} from 'node:crypto';
import { mkdir, readdir, readFile, writeFile } from 'node:fs/promises';
import { dirname, join } from 'node:path';
import { QueryTypes } from 'sequelize';
import { config } from '../config';
import { HistoryCheckpoint, HistorySeal } from '../models';
import { act } from './act';
import { type Actor } from '../http/actor';

export interface CheckpointContent {
  count: number;
  head: string;
  at: string;
}

export interface SignedCheckpoint extends CheckpointContent {
  signature: string;
  /** PEM */
  publicKey: string;
}

/** The characters that a checkpoint's signature covers. */
export function checkpointText({ count, head, at }: CheckpointContent): string {
  return `quartzhold history checkpoint\n${count}\n${head}\n${at}\n`;
}

/** The server's signing key lives in a file outside the database: whoever can rewrite every table still cannot sign. */
async function signingKey(): Promise<KeyObject> {
  const file = config().CHECKPOINT_KEY_FILE;
  try {
    return createPrivateKey(await readFile(file));
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code !== 'ENOENT') throw error;
  }
  const { privateKey } = generateKeyPairSync('ed25519');
  await mkdir(dirname(file), { recursive: true, mode: 0o700 });
  try {
    await writeFile(file, privateKey.export({ type: 'pkcs8', format: 'pem' }), {
      mode: 0o600,
      flag: 'wx',
    });
    return privateKey;
  } catch (error) {
    // Another process made it in the same moment: take that one.
    if ((error as NodeJS.ErrnoException).code !== 'EEXIST') throw error;
    return createPrivateKey(await readFile(file));
  }
}

/**
 * Act `history.checkpoint`: signs count and head of the chain as they stand and writes them to a file outside the database,
 * so that removing the newest entries, or rewriting them all, can be found out.
 */
export async function makeCheckpoint(actor: Actor): Promise<HistoryCheckpoint> {
  const key = await signingKey();
  const checkpoint = await act(actor, 'history.checkpoint', async (transaction) => {
    const [head] = await HistorySeal.sequelize!.query<{ sequence: string; hash: string }>(
      'SELECT sequence, hash FROM history_seals ORDER BY sequence DESC LIMIT 1',
      { type: QueryTypes.SELECT, transaction },
    );
    const at = new Date();
    const content = {
      count: Number(head?.sequence ?? 0),
      head: head?.hash ?? '0'.repeat(64),
      at: at.toISOString(),
    };
    const signature = sign(null, Buffer.from(checkpointText(content)), key).toString('base64');
    const publicKey = createPublicKey(key).export({ type: 'spki', format: 'pem' }).toString();
    const row = await HistoryCheckpoint.create(
      { ...content, count: String(content.count), at, signature, publicKey },
      { transaction },
    );
    return {
      result: row,
      entry: {
        recordType: 'history_checkpoint',
        recordId: row.id,
        after: { ...content, signature },
      },
    };
  });
  const folder = config().CHECKPOINT_FOLDER;
  await mkdir(folder, { recursive: true });
  const { count, head, at, signature, publicKey } = checkpoint;
  const name = `checkpoint-${String(count).padStart(9, '0')}-${at.toISOString().replaceAll(':', '')}.json`;
  await writeFile(
    join(folder, name),
    `${JSON.stringify({ count: Number(count), head, at: at.toISOString(), signature, publicKey }, null, 2)}\n`,
  );
  return checkpoint;
}

/** Checkpoints kept as files outside the database. */
export async function outsideCheckpoints(): Promise<SignedCheckpoint[]> {
  const folder = config().CHECKPOINT_FOLDER;
  const names = await readdir(folder).catch(() => []);
  const files = names.filter((name) => /^checkpoint-.*\.json$/.test(name)).sort();
  return Promise.all(
    files.map(
      async (name) => JSON.parse(await readFile(join(folder, name), 'utf8')) as SignedCheckpoint,
    ),
  );
}
