import { join } from 'node:path';
import { migrate } from '../database/migrate';
import { checkoutFolder } from './checkout';
import { runOrStop } from './command';
import { openDatabase, isEmpty } from './database';
import { startMailFake } from '../mail/fake';
import { choosePort } from './ports';
import { type Running } from './running';
import { say } from './say';
import { keepSecrets, localSecrets } from './secrets';
import { type LaunchSettings } from './settings';

export interface Surroundings {
  /** For the web server and the worker. */
  env: NodeJS.ProcessEnv;
  mailPageUrl?: string;
  demoPassphrase?: string;
}

/** What the server needs around it: a migrated database, somewhere to send mail, the demo. */
export async function prepareSurroundings(
  settings: LaunchSettings,
  running: Running,
  publicUrl: string,
): Promise<Surroundings> {
  const secrets = localSecrets();
  const database = await openDatabase(settings, secrets, running);
  await migrate(database.ownerUrl, new URL(database.appUrl).username);

  const mail = settings.smtpUrl
    ? undefined
    : await running.acquire(async () =>
        startMailFake({
          smtpPort: await choosePort(undefined, 2525),
          pagePort: await choosePort(undefined, 8025),
        }),
      );
  const env: NodeJS.ProcessEnv = {
    ...process.env,
    DATABASE_URL: database.appUrl,
    SMTP_URL: settings.smtpUrl ?? mail?.smtpUrl,
    PUBLIC_URL: settings.publicUrl ?? publicUrl,
    SESSION_SECRET: settings.sessionSecret ?? secrets.sessionSecret,
  };
  // The owner's address is for migrations alone; the server must not hold it.
  delete env.DATABASE_OWNER_URL;
  if (settings.production) return { env };

  const demoPassphrase = settings.demoPassphrase ?? secrets.demoPassphrase;
  if ((await isEmpty(database.ownerUrl)) || demoPassphrase !== secrets.demoPassphrase) {
    say('Filling in the demo (invented data) ...');
    await runOrStop(
      'seed_failed',
      'The demo could not be filled in.',
      process.execPath,
      ['--import', 'tsx', join('seeders', 'run.ts')],
      { cwd: checkoutFolder, env: { ...env, DEMO_PASSPHRASE: demoPassphrase } },
    );
    keepSecrets({ ...secrets, demoPassphrase });
  }
  return {
    env: { ...env, DEMO: 'true' },
    mailPageUrl: mail?.pageUrl,
    demoPassphrase,
  };
}
