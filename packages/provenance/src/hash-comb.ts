/** Lightness in percent by octal digit. Absolute colours: two people in different themes see the same comb. */
const tints = [95, 88, 79, 69, 58, 47, 36, 25] as const;

/** What the comb of a digest looks like; drawing it is the business of the page. */
export interface HashComb {
  /** Lightness in percent: the centre, then the six cells clockwise from one o'clock. */
  tints: number[];
  /** A short keel outside cell 0–5 (clockwise from one o'clock), a ring around all, or nothing. */
  keel: { kind: 'cell'; cell: number } | { kind: 'ring' } | { kind: 'none' };
}

/** The comb of a digest: its first 3 bytes are 8 octal digits; 7 tint the cells, the eighth places the keel. */
export function hashComb(digest: string): HashComb {
  if (!/^[0-9a-f]{6}/.test(digest)) throw new RangeError('a hash comb needs at least six hexadecimal digits');
  const octal = Number.parseInt(digest.slice(0, 6), 16).toString(8).padStart(8, '0');
  const digits = [...octal].map(Number);
  const last = digits[7] ?? 7;
  return {
    tints: digits.slice(0, 7).map((digit) => tints[digit] ?? tints[0]),
    keel: last < 6 ? { kind: 'cell', cell: last } : { kind: last === 6 ? 'ring' : 'none' },
  };
}
