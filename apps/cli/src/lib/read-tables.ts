import type { TableColumns, Tables } from '@nightcone/kernel';
import { tableDigest } from '@nightcone/provenance';
import type { Arguments, Terminal } from './command.ts';
import { wrongInput } from './failure.ts';
import { readJson } from './read-input.ts';

/**
 * The tables that a job refers to, from the files of `--table`: JSON `{ "columns": [{ role, unit, values }] }` in the
 * units of the roles. Wrong input where one is missing or malformed.
 */
export async function readTables(args: Arguments, wanted: readonly string[], terminal: Terminal): Promise<Tables> {
  const tables = new Map<string, TableColumns>();
  for (const path of args.texts('table')) {
    const table = asTable(await readJson(path, terminal), path);
    tables.set(await tableDigest(table), table);
  }
  const missing = wanted.filter((digest) => !tables.has(digest));
  if (missing.length > 0)
    throw wrongInput('invalid-specification', `Give the file of table ${missing.join(', ')} with --table.`);
  return tables;
}

function asTable(value: unknown, path: string): TableColumns {
  const columns = (value as { columns?: unknown } | null)?.columns;
  if (!Array.isArray(columns) || !columns.every(isColumn))
    throw wrongInput(
      'invalid-input',
      `${path} is no table: { "columns": [{ "role", "unit", "values" }] } is expected.`,
    );
  return { columns: columns.map(({ role, unit, values }) => ({ role, unit, values: Float64Array.from(values) })) };
}

function isColumn(value: unknown): value is { role: string; unit: string; values: number[] } {
  const { role, unit, values } = (value ?? {}) as Record<string, unknown>;
  return typeof role === 'string' && typeof unit === 'string' && Array.isArray(values) && values.every(Number.isFinite);
}
