import { countOf } from '@shared/format/counts';
import { listLots, readLot } from '@/api/lots';
import { listParts, readPart, type Part } from '@/api/parts';
import { listReceivers, readReceiver, type Receiver } from '@/api/receivers';
import { listSuppliers, readSupplier, type Supplier } from '@/api/suppliers';

export interface PickOption {
  id: string;
  label: string;
  detail: string;
}

/** Where a PickField finds its records: by what one types, and by the id it holds already. */
export interface PickSource {
  key: string;
  search: (find: string, signal: AbortSignal) => Promise<PickOption[]>;
  read: (id: string, signal: AbortSignal) => Promise<PickOption>;
}

const limit = 20;

const partOption = ({ id, partNumber, deviceKind, description }: Part): PickOption => ({
  id,
  label: partNumber,
  detail: description ? `${deviceKind} · ${description}` : deviceKind,
});
const supplierOption = ({ id, name, location }: Supplier): PickOption => ({
  id,
  label: name,
  detail: location,
});
const receiverOption = ({ id, name, description }: Receiver): PickOption => ({
  id,
  label: name,
  detail: description,
});

/** Parts that are in use; one that is retired is still named where it was chosen before. */
export const partSource: PickSource = {
  key: 'parts',
  search: async (find, signal) =>
    (await listParts({ find, limit }, signal)).items.filter(({ active }) => active).map(partOption),
  read: async (id, signal) => partOption(await readPart(id, signal)),
};

export const supplierSource: PickSource = {
  key: 'suppliers',
  search: async (find, signal) =>
    (await listSuppliers({ find, limit, active: 'true' }, signal)).items.map(supplierOption),
  read: async (id, signal) => supplierOption(await readSupplier(id, signal)),
};

export const receiverSource: PickSource = {
  key: 'receivers',
  search: async (find, signal) =>
    (await listReceivers({ find, limit }, signal)).items
      .filter(({ active }) => active)
      .map(receiverOption),
  read: async (id, signal) => receiverOption(await readReceiver(id, signal)),
};

const lotOption = (lot: {
  id: string;
  lotNumber: string;
  part: { partNumber: string };
  unitsMeasured: number;
}): PickOption => ({
  id: lot.id,
  label: lot.lotNumber,
  detail: `${lot.part.partNumber} · ${countOf(lot.unitsMeasured, 'unit')}`,
});

/** Lots with measured units. */
export const measuredLotSource: PickSource = {
  key: 'measured-lots',
  search: async (find, signal) =>
    (await listLots({ find, limit }, signal)).items
      .filter(({ unitsMeasured }) => unitsMeasured > 0)
      .map(lotOption),
  read: async (id, signal) => lotOption(await readLot(id, signal)),
};
