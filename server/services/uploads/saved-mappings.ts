import { createHash } from 'node:crypto';
import { type Transaction } from 'sequelize';
import { Mapping } from '@shared/contract/uploads';
import { reasonColumn } from '../../ingest/header-check';
import { Lot, Person, SavedMapping, type Upload } from '../../models';

/** Files with the same column headings, in the same order, are read in the same way; our own `reason` column is passed over. */
export function headerHash(headings: string[]): string {
  const names = headings.map((name) => name.trim().toLowerCase());
  if (names.at(-1) === reasonColumn) names.pop();
  return createHash('sha256').update(JSON.stringify(names)).digest('hex');
}

export interface KnownMapping {
  mapping: Mapping;
  version: number;
  savedAt: Date;
  savedBy: string;
}

/** How the newest saved mapping of this supplier reads files with these headings. */
export async function savedMappingFor(
  supplierId: string,
  headings: string[],
): Promise<KnownMapping | null> {
  const saved = await SavedMapping.findOne({
    where: { supplierId, headerHash: headerHash(headings) },
    order: [['version', 'DESC']],
  });
  if (!saved) return null;
  const mapping = Mapping.safeParse(saved.mapping);
  if (!mapping.success) return null;
  const person = await Person.findByPk(saved.savedBy, { attributes: ['name'] });
  return {
    mapping: mapping.data,
    version: saved.version,
    savedAt: saved.createdAt,
    savedBy: person?.name ?? '',
  };
}

/** Keeps the mapping of an upload for the next file with the same headings; answers its version, null when there is nothing to key it by. */
export async function rememberMapping(
  transaction: Transaction,
  upload: Upload,
): Promise<number | null> {
  const headings = upload.headings;
  if (!headings?.length || !upload.uploadedBy || !upload.mapping) return null;
  const lot = await Lot.findByPk(upload.lotId, { attributes: ['supplierId'], transaction });
  const hash = headerHash(headings);
  const where = { supplierId: lot!.supplierId, headerHash: hash };
  const newest = await SavedMapping.findOne({ where, order: [['version', 'DESC']], transaction });
  if (newest && JSON.stringify(newest.mapping) === JSON.stringify(upload.mapping))
    return newest.version;
  const version = (newest?.version ?? 0) + 1;
  await SavedMapping.create(
    { ...where, version, mapping: upload.mapping, savedBy: upload.uploadedBy },
    { transaction },
  );
  return version;
}
