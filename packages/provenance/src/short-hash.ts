/** The first 12 digits of a digest in three groups of four, as it stands under a figure: `7f3a·9c21·04be`. */
export function groupedShortHash(digest: string): string {
  return `${digest.slice(0, 4)}·${digest.slice(4, 8)}·${digest.slice(8, 12)}`;
}
