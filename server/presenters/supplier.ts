import { type Supplier as SupplierView } from '@shared/contract/suppliers';
import { type Supplier } from '../models';

export interface SupplierCounts {
  lots: number;
  openHolds: number;
}

/** Expects `contacts` loaded. For the house only: a supplier contact sees no supplier record, not even the own one. */
export function presentSupplier(
  supplier: Supplier,
  counts: SupplierCounts = { lots: 0, openHolds: 0 },
): SupplierView {
  return {
    id: supplier.id,
    name: supplier.name,
    location: supplier.location,
    notes: supplier.notes,
    active: supplier.active,
    contacts: (supplier.contacts ?? []).map(({ id, name, email, state }) => ({
      id,
      name,
      email,
      state,
    })),
    lotsCount: counts.lots,
    openHoldsCount: counts.openHolds,
    version: supplier.version,
    createdAt: supplier.createdAt.toISOString(),
  };
}
