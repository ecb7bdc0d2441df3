import { z } from 'zod';

const port = z.coerce.number().int().min(0).max(65535);
const flag = z.enum(['true', 'false']).transform((value) => value === 'true');

const Settings = z.object({
  NODE_ENV: z.enum(['development', 'test', 'production']).default('development'),
  /** What this process does. */
  QUARTZHOLD_ROLE: z.enum(['web', 'worker', 'both']).default('both'),
  DATABASE_URL: z.url({ protocol: /^postgres(ql)?$/, error: 'must be a postgres:// address' }),
  PORT: port.default(3000),
  HOST: z.string().default('127.0.0.1'),
  /** What people type; links in mails start with it. */
  PUBLIC_URL: z.url({ protocol: /^https?$/, error: 'must be an http(s) address' }).optional(),
  SMTP_URL: z.url({ protocol: /^smtps?$/, error: 'must be an smtp:// address' }),
  MAIL_FROM: z.string().default('Quartzhold <no-reply@quartzhold.test>'),
  SESSION_SECRET: z.string().min(32, 'must have at least 32 characters'),
  SESSION_IDLE_MINUTES: z.coerce.number().positive().default(60),
  SESSION_ABSOLUTE_HOURS: z.coerce.number().positive().max(24).default(12),
  /** Exact proxy addresses or subnets, as Express takes them; unset: none is trusted. */
  TRUST_PROXY: z.string().optional(),
  /** Ed25519 private key (PEM file) that signs checkpoints of the history; kept outside the database. */
  CHECKPOINT_KEY_FILE: z.string().default('.local/keys/checkpoint.pem'),
  /** Checkpoints are also written here, outside the database. */
  CHECKPOINT_FOLDER: z.string().default('.local/checkpoints'),
  GREATEST_UPLOAD_BYTES: z.coerce
    .number()
    .int()
    .positive()
    .default(1024 * 1024 * 1024),
  UPLOAD_QUOTA_BYTES_PER_DAY: z.coerce
    .number()
    .int()
    .positive()
    .default(10 * 1024 * 1024 * 1024),
  LOG_LEVEL: z.enum(['fatal', 'error', 'warn', 'info', 'debug', 'silent']).default('info'),
  /** The demo's accounts exist only when this is true. */
  DEMO: flag.default(false),
});

export type Config = Omit<z.infer<typeof Settings>, 'PUBLIC_URL'> & {
  PUBLIC_URL: string;
  secureCookies: boolean;
};

/** Reads and checks the environment once. A wrong or missing setting throws one line that names it. */
export function readConfig(environment: NodeJS.ProcessEnv = process.env): Config {
  const given = Object.fromEntries(Object.entries(environment).filter(([, value]) => value !== ''));
  const parsed = Settings.safeParse(given);
  if (!parsed.success) {
    const issue = parsed.error.issues[0]!;
    const name = String(issue.path[0]);
    throw new Error(
      `Setting ${name} ${given[name] === undefined ? 'is missing' : 'is wrong'}: ${issue.message}`,
    );
  }
  const settings = parsed.data;
  if (settings.NODE_ENV === 'production' && !settings.PUBLIC_URL) {
    throw new Error('Setting PUBLIC_URL is missing: links in mails and the origin check need it');
  }
  const publicUrl = (settings.PUBLIC_URL ?? `http://${settings.HOST}:${settings.PORT}`).replace(
    /\/$/,
    '',
  );
  return { ...settings, PUBLIC_URL: publicUrl, secureCookies: publicUrl.startsWith('https:') };
}

let current: Config | undefined;
export function config(): Config {
  return (current ??= readConfig());
}
export function useConfig(settings: Config): void {
  current = settings;
}
