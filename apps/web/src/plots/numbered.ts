/** Items with their place in the list as key: for lists whose items have no name and never change places. */
export const numbered = <T>(items: readonly T[]): { key: number; item: T }[] =>
  items.map((item, key) => ({ key, item }));
