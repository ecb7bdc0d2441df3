import { type Role } from '@/stores/session';

/** The words of the top bar, by route name, in the order they stand there. */
export const sectionsByRole: Record<Role, readonly string[]> = {
  technician: ['work', 'lots', 'parts', 'receivers', 'benches'],
  quality_engineer: [
    'work',
    'lots',
    'holds',
    'parts',
    'receivers',
    'suppliers',
    'benches',
    'history',
    'mail',
  ],
  supplier_contact: ['work', 'holds'],
  auditor: ['work', 'lots', 'holds', 'parts', 'receivers', 'benches', 'history', 'mail'],
  administrator: [
    'work',
    'lots',
    'holds',
    'parts',
    'receivers',
    'suppliers',
    'benches',
    'people',
    'history',
    'mail',
  ],
};
