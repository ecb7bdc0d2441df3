import { act } from '../../history/act';
import { type Actor } from '../../http/actor';
import { NotFound } from '../../http/errors';
import { Person } from '../../models';

export async function readTablePreferences(actor: Actor) {
  const person = await Person.findByPk(actor.id);
  return { tables: person?.tablePreferences ?? {} };
}

/** Act `preference.table`: which columns a person sees in a table. */
export function setTablePreference(actor: Actor, table: string, columns: string[]): Promise<void> {
  return act(actor, 'preference.table', async (transaction) => {
    const person = await Person.findByPk(actor.id, {
      transaction,
      lock: transaction.LOCK.NO_KEY_UPDATE,
    });
    if (!person) throw new NotFound('This person');
    const before = person.tablePreferences[table] ?? null;
    await person.update(
      { tablePreferences: { ...person.tablePreferences, [table]: { columns } } },
      { transaction },
    );
    return {
      result: undefined,
      entry: {
        recordType: 'person',
        recordId: person.id,
        before: { table, columns: before?.columns ?? null },
        after: { table, columns },
      },
    };
  });
}
