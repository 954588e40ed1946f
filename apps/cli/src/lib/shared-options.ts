/** Options that several commands share, so that they mean the same everywhere. */
export const kernelOption = { kernel: { type: 'string' } } as const;
export const tableOption = { table: { type: 'string', multiple: true } } as const;
export const threadsOption = { threads: { type: 'string' } } as const;
export const jsonOption = { json: { type: 'boolean' } } as const;

export const kernelHelp = '  --kernel FILE   use this module instead of looking for the one that is named';
export const tableHelp = '  --table FILE    a table the specification refers to, as JSON; may be repeated';
export const threadsHelp = '  --threads N     1 to 256; the same bits for every N (default: as many as pay)';
export const jsonHelp = '  --json          print one JSON object';
export const specificationHelp =
  'The specification is a JSON file, or - for standard input. Defaults may be left out, and `kernel` too: then the\ncurrent one is meant.';
