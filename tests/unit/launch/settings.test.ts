import { describe, expect, it } from 'vitest';
import { readLaunchSettings } from '../../../server/launch/settings';

const production = {
  NODE_ENV: 'production',
  DATABASE_URL: 'postgres://app@db.example/quartzhold',
  DATABASE_OWNER_URL: 'postgres://owner@db.example/quartzhold',
  SMTP_URL: 'smtp://mail.example',
  PUBLIC_URL: 'https://quartzhold.example',
  SESSION_SECRET: 'x'.repeat(32),
};

describe('the settings of a start', () => {
  it('needs none on a machine of one’s own', () => {
    const settings = readLaunchSettings({});
    expect(settings.production).toBe(false);
    expect(settings.databaseUrl).toBeUndefined();
    expect(settings.port).toBeUndefined();
  });

  it('takes an empty setting for one that is not there', () => {
    expect(readLaunchSettings({ PORT: '', SMTP_URL: '' }).port).toBeUndefined();
  });

  it('accepts a complete production', () => {
    expect(readLaunchSettings(production).publicUrl).toBe('https://quartzhold.example');
  });

  it.each([
    'DATABASE_URL',
    'DATABASE_OWNER_URL',
    'SMTP_URL',
    'PUBLIC_URL',
    'SESSION_SECRET',
  ] as const)('stops production without %s in one line that names it', (name) => {
    const line = new RegExp(`^Setting ${name} is missing: [^\\n]+$`);
    expect(() => readLaunchSettings({ ...production, [name]: undefined })).toThrow(line);
  });

  it.each([
    ['PORT', 'eighty'],
    ['PORT', '70000'],
    ['DATABASE_URL', 'mysql://db'],
    ['SMTP_URL', 'mail.example'],
    ['PUBLIC_URL', 'quartzhold'],
    ['SESSION_SECRET', 'short'],
    ['DEMO_PASSPHRASE', 'fourteen chars'],
    ['LOG_LEVEL', 'loud'],
  ])('stops on a wrong %s (%s) in one line that names it', (name, value) => {
    const line = new RegExp(`^Setting ${name} is wrong: [^\\n]+$`);
    expect(() => readLaunchSettings({ [name]: value })).toThrow(line);
  });

  it.each([{ DEMO: 'true' }, { DEMO_PASSPHRASE: 'sixteen letters!' }])(
    'keeps the demo out of production: %o',
    (demo) => {
      expect(() => readLaunchSettings({ ...production, ...demo })).toThrow(
        /^Setting DEMO\w* is wrong/,
      );
    },
  );
});
