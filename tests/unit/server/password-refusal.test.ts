import { describe, expect, it } from 'vitest';
import { passwordRefusal } from '../../../server/services/sign-in/password-refusal';

describe('passwords refused though long enough', () => {
  it.each([
    'passwordpassword',
    'Password123456789',
    'P@ssw0rd12345678',
    'qwertyuiopasdfghjkl',
    '1qaz2wsx3edc4rfv',
    'zaq12wsxcde34rfv',
    '123456789012345',
    '987654321098765',
    'aaaaaaaaaaaaaaa',
    'abcabcabcabcabc',
    'iloveyouiloveyou',
    'letmeinletmein2026',
    'Welcome2026!!!!!',
    'Summer2026Summer2026',
    'administrator123',
    'changemechangeme',
    'correct horse battery staple',
    'quartzholdquartz',
    'Quartz-Crystal-2026',
    'technician12345',
    'abcdefghijklmnop',
    'football football',
  ])('%s', (password) => {
    expect(password.length).toBeGreaterThanOrEqual(15);
    expect(passwordRefusal(password)).toMatch(/sentence of your own/);
  });

  it('a name and an address of the person', () => {
    const own = ['Annelise Brandvold', 'annelise@werft-nord.example'];
    expect(passwordRefusal('Annelise.Brandvold.1987', own)).not.toBeNull();
    expect(passwordRefusal('Annelise.Brandvold.1987')).toBeNull();
  });
});

describe('passwords taken', () => {
  it.each([
    'a heron waits on the weir',
    'vier Krähen über dem Hafen',
    'мой дядя самых честных правил',
    `${'a'.repeat(50)} 😀 ${'a'.repeat(12)}`,
    'a'.repeat(64),
    '水晶は静かに歌う水晶は夜に',
    'kX9#vQ2m!tR7zL4w',
    'seven slow ferries left',
  ])('%s', (password) => expect(passwordRefusal(password)).toBeNull());
});
