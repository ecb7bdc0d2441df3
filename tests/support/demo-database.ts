import { cpSync, existsSync, mkdirSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { onDatabase } from '../../server/database/roles';
import { checkoutFolder, localFolder, makeLocalFolder } from '../../server/launch/checkout';
import { runOrStop } from '../../server/launch/command';
import {
  copyOfTemplate,
  ensureTemplate,
  markOf,
  migratedTemplate,
  serverUrl,
  type TestDatabase,
} from './database';

/** Of every account of the demo in the tests. */
export const demoPassphrase = 'a bittern booms in the reeds';

export interface DemoDatabase extends TestDatabase {
  /** Puts the signing key and the checkpoints of this history into a folder, for one server alone. */
  layOutside(folder: string): void;
}

/**
 * A database of its own with the demo in it. The demo is brought in once, through the product's own acts, and copied
 * from then on; anew each day, because what waits in it is dated from today.
 */
export async function createDemoDatabase(): Promise<DemoDatabase> {
  const mark = markOf(['server', 'shared', 'seeders']);
  const name = `template_demo_${mark}_${new Date().toISOString().slice(0, 10)}`;
  // Checkpoints of one cluster's history mean nothing for another's.
  const cluster = new URL(serverUrl('TEST_ADMIN_URL')).port;
  const outside = join(localFolder, 'test-demo', `${name}_${cluster}`);
  await ensureTemplate(name, await migratedTemplate(), (draft) => fillDemo(draft, outside));
  const database = await copyOfTemplate(name);
  return {
    ...database,
    layOutside(folder) {
      if (existsSync(outside)) cpSync(outside, folder, { recursive: true });
    },
  };
}

async function fillDemo(draft: string, outside: string): Promise<void> {
  makeLocalFolder();
  rmSync(outside, { recursive: true, force: true });
  mkdirSync(outside, { recursive: true });
  const env = {
    ...process.env,
    NODE_ENV: 'development',
    DATABASE_URL: onDatabase(serverUrl('TEST_APP_URL'), draft),
    SMTP_URL: 'smtp://127.0.0.1:1',
    SESSION_SECRET: 'only for the seeding of a test, not for a server',
    LOG_LEVEL: 'silent',
    DEMO_PASSPHRASE: demoPassphrase,
    CHECKPOINT_KEY_FILE: join(outside, 'checkpoint.pem'),
    CHECKPOINT_FOLDER: join(outside, 'checkpoints'),
  };
  await runOrStop(
    'seed_failed',
    'The demo could not be filled in.',
    process.execPath,
    ['--import', 'tsx', 'seeders/run.ts'],
    { cwd: checkoutFolder, env, timeoutMs: 5 * 60_000 },
  );
}
