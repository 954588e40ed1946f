/** `continuum-ribbon` → continuum ribbon. Ids are words of the trade, so lists need no definitions. */
export const modelWords = (id: string): string => id.replaceAll('-', ' ');
