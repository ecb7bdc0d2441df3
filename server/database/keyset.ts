import { InvalidInput } from '../http/errors';

/** A place in a sorted list: the sort values of the last row given out. Opaque to the caller. */
export function encodeCursor(values: (string | number)[]): string {
  return Buffer.from(JSON.stringify(values)).toString('base64url');
}

export function decodeCursor(cursor: string, length: number): (string | number)[] {
  try {
    const values: unknown = JSON.parse(Buffer.from(cursor, 'base64url').toString('utf8'));
    if (
      Array.isArray(values) &&
      values.length === length &&
      values.every((v) => typeof v === 'string' || typeof v === 'number')
    ) {
      return values;
    }
  } catch {
    // said below, in one sentence for all ways of being wrong
  }
  throw new InvalidInput('This page address is not one of ours. Start again from the first page.', {
    after: 'Not a cursor of this list.',
  });
}

/** One row more than asked for tells whether there is a next page. */
export function page<Row, Item>(
  rows: Row[],
  limit: number,
  present: (row: Row) => Item,
  cursorOf: (row: Row) => (string | number)[],
) {
  const items = rows.slice(0, limit);
  const last = items.at(-1);
  return {
    items: items.map(present),
    next: rows.length > limit && last ? encodeCursor(cursorOf(last)) : null,
  };
}

/** For LIKE: what a person typed is text, never a pattern. */
export function likePattern(text: string): string {
  return `%${text.replaceAll('\\', '\\\\').replaceAll('%', '\\%').replaceAll('_', '\\_')}%`;
}
