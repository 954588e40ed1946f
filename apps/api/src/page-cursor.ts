import { Refusal } from './refusal.ts';

/** A cursor is the sort key and id of the last row, opaque to callers. Instants keep their microseconds as text. */
const bad = () =>
  new Refusal('invalid-input', 'cursor: this is no cursor of this list.', {
    errors: [{ field: 'cursor', message: 'This is no cursor of this list.' }],
  });

export function encodeCursor(parts: readonly (string | number | null)[]): string {
  return Buffer.from(JSON.stringify(parts)).toString('base64url');
}

/** Undefined for the first page; refuses a text that is no cursor. */
export function decodeCursor(cursor: string | undefined): (string | number | null)[] | undefined {
  if (cursor === undefined) return undefined;
  try {
    const parts: unknown = JSON.parse(Buffer.from(cursor, 'base64url').toString('utf8'));
    if (Array.isArray(parts) && parts.every((p) => p === null || typeof p === 'string' || typeof p === 'number'))
      return parts;
  } catch {
    // falls through to the refusal
  }
  throw bad();
}

export function instantCursor(cursor: string | undefined): [Date, string] | undefined {
  const parts = decodeCursor(cursor);
  if (!parts) return undefined;
  const [at, id] = parts;
  const date = new Date(typeof at === 'string' ? at : Number.NaN);
  if (Number.isNaN(date.getTime()) || typeof id !== 'string') throw bad();
  return [date, id];
}

export function nextCursor<R>(last: R | undefined, keyOf: (row: R) => [Date, string]): string | null {
  if (last === undefined) return null;
  const [at, id] = keyOf(last);
  return encodeCursor([at.toISOString(), id]);
}
