import { formatQuantity } from '@nightcone/models';
import { groupedShortHash, type ResultRecord } from '@nightcone/provenance';

/** A result in a few lines for people. */
export function summaryText({ specification, jobHash, resultDigest, result, notes }: ResultRecord): string {
  const { arrays, certificate } = result;
  const broken = certificate.checks.filter(({ holds }) => !holds);
  const lines = [
    `model   ${specification.model}`,
    `job     ${jobHash}  ${groupedShortHash(jobHash)}`,
    `result  ${resultDigest}  ${groupedShortHash(resultDigest)}`,
    `kernel  ${specification.kernel}`,
    '',
    ...arrays.map(({ name, dims, shape, unit }) =>
      `  ${name.padEnd(22)} ${shapeText(dims, shape).padEnd(36)} ${unit}`.trimEnd(),
    ),
    '',
    `checks  ${certificate.checks.length - broken.length} of ${certificate.checks.length} hold`,
    ...certificate.checks.map(
      ({ code, computed, expected, tolerance, holds }) =>
        `  ${holds ? 'holds ' : 'BROKEN'} ${code}: ${formatQuantity(computed, '', 9)} for ${formatQuantity(expected, '', 9)} ± ${formatQuantity(tolerance, '', 2)}`,
    ),
    ...notes.map(({ severity, text }) => `${severity}: ${text}`),
  ];
  return `${lines.join('\n')}\n`;
}

const shapeText = (dims: string[], shape: number[]) =>
  dims.length === 0 ? 'one number' : dims.map((dim, i) => `${dim} ${shape[i]}`).join(' × ');
