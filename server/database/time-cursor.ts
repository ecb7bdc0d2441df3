import { InvalidInput } from '../http/errors';
import { decodeCursor } from './keyset';

/** A place in a list ordered by time with the id breaking ties. */
export function timeCursor(cursor: string): { at: Date; id: string } {
  const [time, id] = decodeCursor(cursor, 2);
  const at = new Date(String(time));
  if (Number.isNaN(at.getTime()) || !/^[0-9a-f-]{36}$/.test(String(id)))
    throw new InvalidInput(
      'This page address is not one of ours. Start again from the first page.',
      { after: 'Not a cursor of this list.' },
    );
  return { at, id: String(id) };
}
