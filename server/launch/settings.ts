import { readConfig, type Config } from '../config';
import { LaunchError } from './command';

/** What a person may set before `npm start`; everything is optional outside production. */
export interface LaunchSettings {
  production: boolean;
  /** The server's own settings, with stand-ins where the launcher provides the value itself. */
  config: Config;
  databaseUrl?: string;
  databaseOwnerUrl?: string;
  port?: number;
  smtpUrl?: string;
  publicUrl?: string;
  sessionSecret?: string;
  demoPassphrase?: string;
}

/** What production must name and a start on one's own machine provides. */
const provided = {
  DATABASE_URL: 'postgres://127.0.0.1/quartzhold',
  DATABASE_OWNER_URL: 'postgres://127.0.0.1/quartzhold',
  SMTP_URL: 'smtp://127.0.0.1',
  PUBLIC_URL: 'http://127.0.0.1',
  SESSION_SECRET: 'a stand-in that nothing is signed with',
};
const leastPassphrase = 15;

/** Reads and checks the settings; the first that is wrong or missing stops the start by name. */
export function readLaunchSettings(environment: NodeJS.ProcessEnv): LaunchSettings {
  const env = Object.fromEntries(
    Object.entries(environment).filter(([, value]) => value !== undefined && value !== ''),
  ) as Record<string, string | undefined>;
  const production = env.NODE_ENV === 'production';
  if (production) {
    const absent = Object.keys(provided).find((name) => !env[name]);
    if (absent) throw missing(absent, 'production (NODE_ENV=production) needs it');
    if (env.DEMO === 'true' || env.DEMO_PASSPHRASE) {
      const name = env.DEMO_PASSPHRASE ? 'DEMO_PASSPHRASE' : 'DEMO';
      throw wrong(name, 'production has no demo accounts, leave it out');
    }
  }
  if (env.DATABASE_OWNER_URL && !env.DATABASE_URL) {
    throw missing('DATABASE_URL', 'DATABASE_OWNER_URL is set, so it must be too');
  }
  if (env.DATABASE_OWNER_URL && !/^postgres(ql)?:\/\//.test(env.DATABASE_OWNER_URL)) {
    throw wrong('DATABASE_OWNER_URL', 'must be a postgres:// address');
  }
  if (env.DEMO_PASSPHRASE && env.DEMO_PASSPHRASE.length < leastPassphrase) {
    throw wrong('DEMO_PASSPHRASE', `must have at least ${leastPassphrase} characters`);
  }
  return {
    production,
    config: checked({ ...provided, ...env }),
    databaseUrl: env.DATABASE_URL,
    databaseOwnerUrl: env.DATABASE_OWNER_URL,
    port: Number(env.PORT ?? 0) || undefined,
    smtpUrl: env.SMTP_URL,
    publicUrl: env.PUBLIC_URL,
    sessionSecret: env.SESSION_SECRET,
    demoPassphrase: env.DEMO_PASSPHRASE,
  };
}

function checked(env: NodeJS.ProcessEnv): Config {
  try {
    return readConfig(env);
  } catch (error) {
    throw new LaunchError('setting_wrong', (error as Error).message);
  }
}

function wrong(name: string, why: string): LaunchError {
  return new LaunchError('setting_wrong', `Setting ${name} is wrong: ${why}`);
}

function missing(name: string, why: string): LaunchError {
  return new LaunchError('setting_missing', `Setting ${name} is missing: ${why}`);
}
