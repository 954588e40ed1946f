import type { ResultArrayData } from '@nightcone/kernel';
import { formatQuantity } from '@nightcone/models';
import { groupedShortHash, type ResultRecord, raggedLayout } from '@nightcone/provenance';

/** A result in a few lines for people. */
export function summaryText({ specification, jobHash, resultDigest, result, notes }: ResultRecord): string {
  const { arrays, certificate } = result;
  const held = certificate.checks.filter(({ holds }) => holds).length;
  const lines = [
    `model   ${specification.model}`,
    `job     ${jobHash}  ${groupedShortHash(jobHash)}`,
    `result  ${resultDigest}  ${groupedShortHash(resultDigest)}`,
    `kernel  ${specification.kernel}`,
    '',
    ...columns(arrays.map((array) => [array.name, shapeText(array, arrays), array.unit])),
    '',
    ...columns(Object.entries(certificate.numbers).map(([name, value]) => [name, formatQuantity(value, '', 3)])),
    `checks  ${held} of ${certificate.checks.length} hold`,
    ...columns(certificate.checks.map((check) => [check.holds ? 'holds' : 'BROKEN', check.code, checkText(check)])),
    ...notes.map(({ severity, text }) => `${severity}: ${text}`),
  ];
  return `${lines.join('\n')}\n`;
}

type Check = ResultRecord['result']['certificate']['checks'][number];

const checkText = ({ computed, expected, tolerance }: Check) =>
  `${formatQuantity(computed, '', 9)} for ${formatQuantity(expected, '', 9)} ± ${formatQuantity(tolerance, '', 2)}`;

function shapeText(array: ResultArrayData, all: readonly ResultArrayData[]): string {
  const { dims, shape } = array;
  const layout = raggedLayout(array, all);
  if (layout === undefined) return sizes(dims, shape) || 'one number';
  const each = [layout.listDim, ...layout.entryDims];
  return `${sizes(each, shape)} in lists over ${layout.rowDims.join(' × ')}`;
}

const sizes = (dims: string[], shape: number[]) => dims.map((dim, i) => `${dim} ${shape[i]}`).join(' × ');

/** Rows as indented lines whose cells stand below each other. */
function columns(rows: string[][]): string[] {
  const width = (i: number) => Math.max(...rows.map((row) => row[i]?.length ?? 0));
  return rows.map((row) => `  ${row.map((cell, i) => cell.padEnd(width(i))).join('  ')}`.trimEnd());
}
