import { type Role } from '@shared/contract/common';

interface Standing {
  id: string;
  role: Role;
  state: 'invited' | 'active' | 'disabled';
}

/** Why an administrator may not disable this person, or null. */
export function whyNotDisable(
  actorId: string,
  person: Standing,
  activeAdministrators: number,
): string | null {
  if (person.state === 'disabled') return 'This person is disabled already.';
  if (person.id === actorId) return 'Nobody disables their own account. Ask another administrator.';
  if (isLastAdministrator(person, activeAdministrators))
    return 'This is the only active administrator. Make another one first.';
  return null;
}

/** Why a person may not get this role, or null. */
export function whyNotRole(
  actorId: string,
  person: Standing,
  role: Role,
  activeAdministrators: number,
): string | null {
  if (person.role === role) return null;
  if (person.id === actorId) return 'Nobody changes their own role. Ask another administrator.';
  if (isLastAdministrator(person, activeAdministrators))
    return 'This is the only active administrator. Make another one first.';
  return null;
}

function isLastAdministrator(person: Standing, activeAdministrators: number): boolean {
  return person.role === 'administrator' && person.state === 'active' && activeAdministrators <= 1;
}
