export { groupedShortHash as shortHash } from '@nightcone/provenance';

/** What people paste: grouping marks, blanks and a `sha256:` in front are dropped. */
export const cleanHash = (text: string): string =>
  text
    .trim()
    .toLowerCase()
    .replace(/^sha-?256[:\s]/, '')
    .replace(/[·\s.:-]/g, '');
