import { LaunchError } from './command';

/** What a person may set before `npm start`; everything is optional outside production. */
export interface LaunchSettings {
  production: boolean;
  databaseUrl?: string;
  databaseOwnerUrl?: string;
  port?: number;
  smtpUrl?: string;
  publicUrl?: string;
  sessionSecret?: string;
  demoPassphrase?: string;
}

/** Reads and checks the settings; the first that is wrong or missing stops the start by name. */
export function readLaunchSettings(env: NodeJS.ProcessEnv): LaunchSettings {
  const settings: LaunchSettings = {
    production: env.NODE_ENV === 'production',
    databaseUrl: url(env, 'DATABASE_URL', ['postgres:', 'postgresql:']),
    databaseOwnerUrl: url(env, 'DATABASE_OWNER_URL', ['postgres:', 'postgresql:']),
    port: port(env, 'PORT'),
    smtpUrl: url(env, 'SMTP_URL', ['smtp:', 'smtps:']),
    publicUrl: url(env, 'PUBLIC_URL', ['http:', 'https:']),
    sessionSecret: text(env, 'SESSION_SECRET', 32),
    demoPassphrase: text(env, 'DEMO_PASSPHRASE', 15),
  };
  if (settings.databaseOwnerUrl && !settings.databaseUrl) {
    throw missing('DATABASE_URL', 'DATABASE_OWNER_URL is set, so it must be too');
  }
  if (settings.production) {
    const needed = {
      DATABASE_URL: settings.databaseUrl,
      DATABASE_OWNER_URL: settings.databaseOwnerUrl,
      SMTP_URL: settings.smtpUrl,
      PUBLIC_URL: settings.publicUrl,
      SESSION_SECRET: settings.sessionSecret,
    };
    for (const [name, value] of Object.entries(needed)) {
      if (!value) throw missing(name, 'production (NODE_ENV=production) needs it');
    }
    if (settings.demoPassphrase) {
      throw wrong('DEMO_PASSPHRASE', 'production has no demo accounts: leave it out');
    }
  }
  return settings;
}

function url(env: NodeJS.ProcessEnv, name: string, protocols: string[]): string | undefined {
  const value = env[name]?.trim();
  if (!value) return undefined;
  const parsed = URL.canParse(value) ? new URL(value) : undefined;
  if (!parsed || !protocols.includes(parsed.protocol)) {
    throw wrong(name, `it must be an address that begins with ${protocols[0]}//`);
  }
  return value;
}

function port(env: NodeJS.ProcessEnv, name: string): number | undefined {
  const value = env[name]?.trim();
  if (!value) return undefined;
  const number = Number(value);
  if (!/^\d+$/.test(value) || number < 1 || number > 65_535) {
    throw wrong(name, 'it must be a whole number from 1 to 65535');
  }
  return number;
}

function text(env: NodeJS.ProcessEnv, name: string, atLeast: number): string | undefined {
  const value = env[name];
  if (!value) return undefined;
  if (value.length < atLeast) throw wrong(name, `it must have ${atLeast} characters or more`);
  return value;
}

function wrong(name: string, why: string): LaunchError {
  return new LaunchError('setting_wrong', `The setting ${name} is wrong: ${why}.`);
}

function missing(name: string, why: string): LaunchError {
  return new LaunchError('setting_missing', `The setting ${name} is missing: ${why}.`);
}
