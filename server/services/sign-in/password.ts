import { hash, verify, type Options } from '@node-rs/argon2';
import { config } from '../../config';

const argon2id = 2;

/**
 * argon2id with the parameters of OWASP's Password Storage Cheat Sheet (19 MiB, 2 passes, 1 lane). Only the test
 * environment takes less, because there every agent signs in.
 */
export function passwordCost(): Options {
  return config().NODE_ENV === 'test'
    ? { algorithm: argon2id, memoryCost: 1024, timeCost: 1, parallelism: 1 }
    : { algorithm: argon2id, memoryCost: 19_456, timeCost: 2, parallelism: 1 };
}

export function hashPassword(password: string): Promise<string> {
  return hash(password, passwordCost());
}

let dummy: Promise<string> | undefined;
/** Compared with when there is nobody to compare with, so that strangers and members wait the same time. */
function dummyHash(): Promise<string> {
  return (dummy ??= hashPassword('nobody has this password'));
}

/** Always verifies one hash; without a stored one the answer is no. */
export async function verifyPassword(stored: string | null, password: string): Promise<boolean> {
  const matches = await verify(stored ?? (await dummyHash()), password);
  return stored !== null && matches;
}

/** True when the hash was made with parameters other than today's. */
export function isOutdated(stored: string): boolean {
  const { memoryCost, timeCost, parallelism } = passwordCost();
  return !stored.startsWith(`$argon2id$v=19$m=${memoryCost},t=${timeCost},p=${parallelism}$`);
}
