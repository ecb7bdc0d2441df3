import { Op, QueryTypes, type WhereOptions } from 'sequelize';
import { type QueryOf } from '@shared/contract/endpoint';
import { type listParts } from '@shared/contract/parts';
import { decodeCursor, likePattern, page } from '../../database/keyset';
import { NotFound } from '../../http/errors';
import { Lot, Part, PartRevision, Receiver } from '../../models';
import { presentPart, presentPartWithRevisions } from '../../presenters/part';

const withRevisions = [
  { model: PartRevision, as: 'revisions', separate: true, include: ['creator', 'approval'] },
  { model: Receiver, as: 'receivers' },
];

async function lotCounts(partIds: string[]): Promise<Map<string, number>> {
  if (partIds.length === 0) return new Map();
  const rows = await Lot.sequelize!.query<{ part_id: string; count: string }>(
    'SELECT part_id, count(*) FROM lots WHERE part_id IN (:partIds) GROUP BY part_id',
    { replacements: { partIds }, type: QueryTypes.SELECT },
  );
  return new Map(rows.map((row) => [row.part_id, Number(row.count)]));
}

export async function readPart(id: string) {
  const part = await Part.findByPk(id, { include: withRevisions });
  if (!part) throw new NotFound('This part');
  return presentPartWithRevisions(part, (await lotCounts([id])).get(id) ?? 0);
}

export async function readParts(query: QueryOf<typeof listParts>) {
  const where: WhereOptions[] = [];
  if (query.find)
    where.push({
      [Op.or]: [
        { partNumber: { [Op.iLike]: likePattern(query.find) } },
        { description: { [Op.iLike]: likePattern(query.find) } },
      ],
    });
  if (query.deviceKind) where.push({ deviceKind: query.deviceKind });
  if (query.after) where.push({ partNumber: { [Op.gt]: decodeCursor(query.after, 1)[0] } });
  // Ids first, then the rows with what belongs to them: a limit over joined rows would count the joins.
  const ids = await Part.findAll({
    attributes: ['id', 'partNumber'],
    where: { [Op.and]: where },
    order: ['partNumber'],
    limit: query.limit + 1,
  });
  const parts = await Part.findAll({
    where: { id: ids.map((row) => row.id) },
    include: withRevisions,
    order: ['partNumber'],
  });
  const counts = await lotCounts(parts.map((part) => part.id));
  return page(
    parts,
    query.limit,
    (part) => presentPart(part, counts.get(part.id) ?? 0),
    (part) => [part.partNumber],
  );
}
