import { ticks as d3Ticks, tickStep } from 'd3';

export interface TickValue {
  value: number;
  /** null for a minor tick. */
  label: string | null;
}

/** Labelled ticks about `spacing` px apart and minor ones between them; labels share their number of decimals. */
export function axisTicks(
  domain: readonly [number, number],
  length: number,
  spacing: number,
  integer = false,
): TickValue[] {
  const [from, to] = domain;
  if (!(to > from)) return [];
  let wanted = Math.max(2, Math.floor(length / spacing));
  // two labels tell a scale, one does not
  while (!integer && wanted < 9 && d3Ticks(from, to, wanted).length < 3) wanted++;
  let step = tickStep(from, to, wanted);
  if (integer) step = Math.max(1, Math.round(step));
  const count = (to - from) / step;
  const majors = integer ? multiples(from, to, step) : d3Ticks(from, to, wanted);
  const largest = Math.max(Math.abs(from), Math.abs(to));
  const scientific = largest >= 1e6 || largest < 1e-3;
  const decimals = scientific ? 0 : Math.max(0, -Math.floor(Math.log10(step) + 1e-9));
  const label = (value: number) => {
    const text = scientific ? trimmed(value) : value.toFixed(decimals);
    return /^-0(\.0*)?$/.test(text) ? text.slice(1) : text.replace('-', '−').replace('e−', 'e−');
  };
  const minorStep = step / minorParts(step);
  const minors =
    integer && minorStep < 1 ? [] : (to - from) / minorStep > 200 || count > 40 ? [] : multiples(from, to, minorStep);
  const near = (a: number, b: number) => Math.abs(a - b) < step * 1e-6;
  return [
    ...majors.map((value) => ({ value, label: trimZeros(label(value), majors.map(label)) })),
    ...minors.filter((value) => !majors.some((major) => near(major, value))).map((value) => ({ value, label: null })),
  ];
}

/** 1 → 5 parts or 2, 2 → 2, 5 → 5: minor ticks on round numbers. */
function minorParts(step: number): number {
  const first = Math.round(step / 10 ** Math.floor(Math.log10(step) + 1e-9));
  return first === 1 || first === 2 ? 2 : 5;
}

function multiples(from: number, to: number, step: number): number[] {
  const first = Math.ceil(from / step - 1e-9);
  const last = Math.floor(to / step + 1e-9);
  return Array.from({ length: Math.max(0, last - first + 1) }, (_, i) => (first + i) * step);
}

const trimmed = (value: number) =>
  value === 0
    ? '0'
    : value
        .toExponential(2)
        .replace(/\.?0+e/, 'e')
        .replace('e+', 'e');

/** '1.0' reads '1' as soon as whole and broken numbers stand together; the others keep their decimals. */
function trimZeros(label: string, all: string[]): string {
  return all.some((other) => /\.\d*[1-9]/.test(other)) ? label.replace(/\.0+$/, '') : label;
}
