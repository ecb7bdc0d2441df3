import { Op, QueryTypes, type WhereOptions } from 'sequelize';
import { type QueryOf } from '@shared/contract/endpoint';
import { type listPeople } from '@shared/contract/people';
import { database } from '../../database/connection';
import { decodeCursor, likePattern, page } from '../../database/keyset';
import { NotFound } from '../../http/errors';
import { Person } from '../../models';
import { presentPerson, type LatestLink } from '../../presenters/person';
import { accountDelays } from '../sign-in/attempts';

/** What became of the latest mailed link of each person. */
async function latestLinks(ids: string[]): Promise<Map<string, LatestLink>> {
  if (ids.length === 0) return new Map();
  const rows = await database().sequelize.query<LatestLink>(
    `SELECT DISTINCT ON (links.person_id) links.person_id AS "personId", links.purpose, mails.state AS "mailState",
            mails.last_answer AS "lastAnswer", mails.accepted_at AS "sentAt", links.expires_at AS "expiresAt",
            links.used_at AS "usedAt"
     FROM person_links links JOIN mails ON mails.id = links.mail_id
     WHERE links.person_id IN (:ids) ORDER BY links.person_id, links.created_at DESC, links.id`,
    { replacements: { ids }, type: QueryTypes.SELECT },
  );
  return new Map(rows.map((row) => [row.personId, row]));
}

async function withSurroundings(people: Person[]) {
  const [links, delays] = await Promise.all([
    latestLinks(people.map((person) => person.id)),
    accountDelays(people.map((person) => person.email)),
  ]);
  return (person: Person) =>
    presentPerson(person, links.get(person.id) ?? null, delays.get(person.email) ?? null);
}

export async function readPerson(id: string) {
  const person = await Person.findByPk(id, { include: ['supplier'] });
  if (!person) throw new NotFound('This person');
  return (await withSurroundings([person]))(person);
}

/** By name. */
export async function readPeople(query: QueryOf<typeof listPeople>) {
  const where: WhereOptions[] = [];
  if (query.find) {
    const pattern = { [Op.iLike]: likePattern(query.find) };
    where.push({ [Op.or]: [{ name: pattern }, { email: pattern }] });
  }
  if (query.role) where.push({ role: query.role });
  if (query.after) {
    const [name, id] = decodeCursor(query.after, 2) as [string, string];
    where.push({ [Op.or]: [{ name: { [Op.gt]: name } }, { name, id: { [Op.gt]: id } }] });
  }
  const people = await Person.findAll({
    where: { [Op.and]: where },
    include: ['supplier'],
    order: ['name', 'id'],
    limit: query.limit + 1,
  });
  return page(people, query.limit, await withSurroundings(people), (person) => [
    person.name,
    person.id,
  ]);
}
