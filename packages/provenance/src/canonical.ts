import canonicalize from 'canonicalize';

/**
 * Canonical JSON of a value (RFC 8785): sorted names, shortest numbers, no white space; -0 is written 0. Throws on
 * NaN, infinities, lone surrogates, and on a value that JSON has no text for.
 */
export function canonicalJson(value: unknown): string {
  const text = canonicalize(value);
  if (text === undefined) throw new TypeError('nothing to write: the value has no JSON text');
  return text;
}
