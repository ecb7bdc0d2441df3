import { createHash } from 'node:crypto';
import { QueryTypes, type Transaction } from 'sequelize';
import { database, inTransaction } from '../../database/connection';
import { TooMany } from '../../http/errors';

/** How guessing is slowed: `free` tries, then a wait that doubles from `firstMs` to `greatestMs`, forgotten after `memoryMs`. */
interface Brake {
  free: number;
  firstMs: number;
  greatestMs: number;
}
const memoryMs = 24 * 3600_000;
const greatestMs = 15 * 60_000;

const brakes = {
  /** One account from one address: the owner elsewhere is not held up by somebody else's guessing here. */
  pair: { free: 5, firstMs: 2_000, greatestMs },
  /** One account from anywhere: fewer than 100 wrong tries in a row before the waits are long. */
  account: { free: 30, firstMs: 2_000, greatestMs },
  /** One address for any account. */
  address: { free: 40, firstMs: 2_000, greatestMs },
  /** Mails that strangers can make us send. */
  resetAccount: { free: 3, firstMs: 60_000, greatestMs },
  resetAddress: { free: 20, firstMs: 10_000, greatestMs },
  link: { free: 60, firstMs: 2_000, greatestMs },
} satisfies Record<string, Brake>;
export type BrakeName = keyof typeof brakes;

export interface Counter {
  brake: BrakeName;
  /** Hashed before they are kept: addresses that strangers typed are nobody's to read. */
  subject: string[];
}

function hashed(text: string): string {
  return createHash('sha256').update(text).digest('hex').slice(0, 32);
}

export function keyOf({ brake, subject }: Counter): string {
  return [brake, ...subject.map(hashed)].join(':');
}

function accountOf(email: string): string {
  return email.toLowerCase();
}

export function signInCounters(email: string, address: string): Counter[] {
  return [
    { brake: 'account', subject: [accountOf(email)] },
    { brake: 'address', subject: [address] },
    { brake: 'pair', subject: [accountOf(email), address] },
  ];
}

export function resetCounters(email: string, address: string): Counter[] {
  return [
    { brake: 'resetAccount', subject: [accountOf(email)] },
    { brake: 'resetAddress', subject: [address] },
  ];
}

/** Wait after the n-th counted try, in ms. */
export function waitAfter(brake: BrakeName, tries: number): number {
  const { free, firstMs, greatestMs: most } = brakes[brake];
  return tries < free ? 0 : Math.min(most, firstMs * 2 ** Math.min(tries - free, 30));
}

/**
 * Counts a try on every counter before it is made, so that parallel tries cannot slip past, or throws TooMany while a
 * wait runs. Tries during a wait are not counted: nobody can prolong it, so nobody can lock another out for good.
 * Counters stand in PostgreSQL and hold across server processes.
 */
export async function countAttempt(counters: Counter[]): Promise<void> {
  const now = Date.now();
  // In one order everywhere, so that two requests never wait for each other.
  const sorted = [...counters].sort((a, b) => (keyOf(a) < keyOf(b) ? -1 : 1));
  await inTransaction(async (transaction) => {
    for (const counter of sorted) {
      const key = keyOf(counter);
      const known = await lockCounter(transaction, key, now);
      const wait = waitAfter(counter.brake, known.points);
      const waitMs = known.lastTryAt + wait - now;
      // A parallel try may have been counted a moment after our own `now`: without a wait that means nothing.
      if (wait > 0 && waitMs > 0) {
        const seconds = Math.ceil(waitMs / 1000);
        throw new TooMany(
          `Too many tries. Please wait ${seconds < 90 ? `${seconds} s` : `${Math.ceil(seconds / 60)} min`} and try again.`,
          seconds,
          'sign_in.delayed',
        );
      }
      await database().sequelize.query(
        'UPDATE rate_limits SET points = :points, expire = :expire WHERE key = :key',
        { replacements: { key, points: known.points + 1, expire: now + memoryMs }, transaction },
      );
    }
  });
}

async function lockCounter(transaction: Transaction, key: string, now: number) {
  const [row] = await database().sequelize.query<{ points: number; expire: string }>(
    `INSERT INTO rate_limits (key, points, expire) VALUES (:key, 0, :expire)
     ON CONFLICT (key) DO UPDATE SET key = excluded.key RETURNING points, expire`,
    { replacements: { key, expire: now + memoryMs }, transaction, type: QueryTypes.SELECT },
  );
  const expire = Number(row!.expire);
  // `expire` is a day after the last try, so it tells when that was.
  return expire <= now
    ? { points: 0, lastTryAt: 0 }
    : { points: row!.points, lastTryAt: expire - memoryMs };
}

/** After success: the account starts anew; the address only gets its try back, or one own account would free all guesses. */
export async function forgiveAttempt(counters: Counter[]): Promise<void> {
  const keys = (address: boolean) =>
    counters.filter(({ brake }) => (brake === 'address') === address).map(keyOf);
  await database().sequelize.query('DELETE FROM rate_limits WHERE key IN (:keys)', {
    replacements: { keys: [...keys(false), ''] },
  });
  await database().sequelize.query(
    'UPDATE rate_limits SET points = greatest(points - 1, 0) WHERE key IN (:keys)',
    { replacements: { keys: [...keys(true), ''] } },
  );
}

/** Ends every wait on an account, from wherever the tries came: an administrator's help, or a proved mailbox. */
export async function forgiveAccount(email: string): Promise<void> {
  const account = accountOf(email);
  await database().sequelize.query(
    'DELETE FROM rate_limits WHERE key = :account OR key LIKE :pairs',
    {
      replacements: {
        account: keyOf({ brake: 'account', subject: [account] }),
        pairs: `${keyOf({ brake: 'pair', subject: [account] })}:%`,
      },
    },
  );
}

/** When the account-wide wait ends, if one runs: for administrators. */
export async function accountDelays(emails: string[]): Promise<Map<string, Date>> {
  if (emails.length === 0) return new Map();
  const byKey = new Map(
    emails.map((email) => [keyOf({ brake: 'account', subject: [accountOf(email)] }), email]),
  );
  const rows = await database().sequelize.query<{ key: string; points: number; expire: string }>(
    'SELECT key, points, expire FROM rate_limits WHERE key IN (:keys)',
    { replacements: { keys: [...byKey.keys()] }, type: QueryTypes.SELECT },
  );
  const delays = new Map<string, Date>();
  for (const row of rows) {
    const until = Number(row.expire) - memoryMs + waitAfter('account', row.points);
    if (until > Date.now()) delays.set(byKey.get(row.key)!, new Date(until));
  }
  return delays;
}
