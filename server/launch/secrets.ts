import { randomBytes, randomInt } from 'node:crypto';
import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { localFolder, makeLocalFolder } from './checkout';
import { readIfThere } from './lock';

/** Made once for this checkout and kept, so that sign-ins and sessions survive a restart. */
export interface Secrets {
  sessionSecret: string;
  demoPassphrase: string;
  ownerPassword: string;
  appPassword: string;
}

const file = join(localFolder, 'secrets.json');

export function localSecrets(): Secrets {
  const kept = JSON.parse(readIfThere(file) ?? '{}') as Partial<Secrets>;
  const secrets: Secrets = {
    sessionSecret: kept.sessionSecret ?? randomBytes(48).toString('base64url'),
    demoPassphrase: kept.demoPassphrase ?? newPassphrase(),
    ownerPassword: kept.ownerPassword ?? randomBytes(24).toString('base64url'),
    appPassword: kept.appPassword ?? randomBytes(24).toString('base64url'),
  };
  if (Object.keys(kept).length < Object.keys(secrets).length) keepSecrets(secrets);
  return secrets;
}

export function keepSecrets(secrets: Secrets): void {
  makeLocalFolder();
  writeFileSync(file, `${JSON.stringify(secrets, null, 2)}\n`, { mode: 0o600 });
}

/** Four groups a person can read aloud and type: no letters that look like digits. */
function newPassphrase(): string {
  const letters = 'abcdefghjkmnpqrstuvwxyz23456789';
  const group = () => Array.from({ length: 5 }, () => letters[randomInt(letters.length)]).join('');
  return [group(), group(), group(), group()].join('-');
}
