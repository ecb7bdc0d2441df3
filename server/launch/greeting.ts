import { say } from './say';
import { type Surroundings } from './surroundings';

const demoPeople = [
  ['technician@quartzhold.test', 'line technician'],
  ['quality@quartzhold.test', 'quality engineer'],
  ['quality2@quartzhold.test', 'second quality engineer'],
  ['supplier@quartzhold.test', 'supplier contact'],
  ['supplier2@quartzhold.test', 'contact of another supplier'],
  ['auditor@quartzhold.test', 'auditor'],
  ['admin@quartzhold.test', 'administrator'],
] as const;

/** What a person needs to begin. */
export function greet(address: string, surroundings: Surroundings): void {
  say('');
  say(`Quartzhold is ready:  ${address}`);
  if (surroundings.mailPageUrl) say(`Mail it has sent:     ${surroundings.mailPageUrl}`);
  if (surroundings.demoPassphrase) {
    say('');
    say('Demo sign-ins (invented people and lots):');
    for (const [email, role] of demoPeople) say(`  ${email.padEnd(28)} ${role}`);
    say(`  passphrase for all:          ${surroundings.demoPassphrase}`);
  }
  say('');
  say('Ctrl-C stops everything.');
}
