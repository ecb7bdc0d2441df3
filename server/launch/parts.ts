import { existsSync } from 'node:fs';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { checkoutFolder } from './checkout';
import { LaunchError } from './command';

export interface MailFake {
  smtpUrl: string;
  pageUrl: string;
  stop: () => Promise<void>;
}

export async function startMailFake(ports: { smtpPort: number; pagePort: number }) {
  const part = await load<{ startMailFake: (p: typeof ports) => Promise<MailFake> }>(
    'server/mail/fake.ts',
  );
  return part.startMailFake(ports);
}

async function load<T>(place: string): Promise<T> {
  const file = join(checkoutFolder, place);
  if (!existsSync(file)) throw new LaunchError('part_missing', `${place} is not there yet.`);
  return (await import(pathToFileURL(file).href)) as T;
}
