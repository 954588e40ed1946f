import type { Json } from './fields.ts';

/** JSON Pointer, RFC 6901. */

const arrayIndex = /^(0|[1-9][0-9]*)$/;

/** Reference tokens of a pointer; '' is the whole document. Throws on a text that is no pointer. */
export function pointerTokens(pointer: string): string[] {
  if (pointer === '') return [];
  if (!pointer.startsWith('/') || /~(?![01])/.test(pointer)) throw new SyntaxError(`“${pointer}” is no JSON Pointer`);
  return pointer
    .slice(1)
    .split('/')
    .map((token) => token.replaceAll('~1', '/').replaceAll('~0', '~'));
}

/** The pointer with these reference tokens. */
export function pointerOf(tokens: readonly (string | number)[]): string {
  return tokens.map((token) => `/${String(token).replaceAll('~', '~0').replaceAll('/', '~1')}`).join('');
}

/** The value at `pointer`, or undefined where there is none. */
export function getPointer(document: unknown, pointer: string): Json | undefined {
  return getTokens(document, pointerTokens(pointer));
}

export function getTokens(document: unknown, tokens: readonly (string | number)[]): Json | undefined {
  let at: unknown = document;
  for (const token of tokens) {
    if (Array.isArray(at)) {
      at = arrayIndex.test(String(token)) ? at[Number(token)] : undefined;
    } else if (typeof at === 'object' && at !== null && Object.hasOwn(at, token)) {
      at = (at as Record<string, unknown>)[token];
    } else {
      return undefined;
    }
  }
  return at as Json | undefined;
}

/**
 * A copy of `document` with `value` at `pointer`; what the path does not touch is shared with the original. The place
 * above it must exist; an object takes a new member, a list takes an index up to its length. Throws RangeError.
 */
export function setPointer<D extends Json>(document: D, pointer: string, value: Json): D {
  return place(document, pointerTokens(pointer), 0, value, pointer) as D;
}

function place(at: Json | undefined, tokens: string[], depth: number, value: Json, pointer: string): Json {
  const token = tokens[depth];
  if (token === undefined) return value;
  if (Array.isArray(at)) {
    const index = token === '-' ? at.length : arrayIndex.test(token) ? Number(token) : -1;
    if (index < 0 || index > at.length) throw new RangeError(`${pointer}: the list has no place “${token}”`);
    const copy = at.slice();
    copy[index] = place(at[index], tokens, depth + 1, value, pointer);
    return copy;
  }
  if (typeof at === 'object' && at !== null) {
    const inner = Object.hasOwn(at, token) ? at[token] : undefined;
    // a computed key makes an own property even of "__proto__"
    return { ...at, [token]: place(inner, tokens, depth + 1, value, pointer) };
  }
  throw new RangeError(
    `${pointer}: there is nothing at ${pointerOf(tokens.slice(0, depth))} that could hold “${token}”`,
  );
}
