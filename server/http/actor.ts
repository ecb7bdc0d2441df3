import { type Role } from '@shared/contract/common';

/** Who does something: a signed-in person, a bench by its token, or the product itself. */
export interface Actor {
  kind: 'person' | 'bench' | 'system';
  id: string;
  name: string;
  role: Role | 'bench' | 'system';
  supplierId: string | null;
  /** For the limits only; kept in no record. */
  address: string;
}

export const system: Actor = {
  kind: 'system',
  id: 'system',
  name: 'Quartzhold',
  role: 'system',
  supplierId: null,
  address: '',
};
