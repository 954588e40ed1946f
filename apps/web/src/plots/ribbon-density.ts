import { formatQuantity, type Mark } from '@nightcone/drawing';
import { type BuiltPlot, domainOf, rangeOf } from './built-plot.ts';
import { axisOf, need, type ResultData, rowBounds } from './result-data.ts';

const valleyWords = (sign: number) => (sign > 0 ? 'valley K' : sign < 0 ? 'valley K′' : 'both valleys');

/** One entry for every valley and every k whose densities were asked for. */
export function densityStates(data: ResultData): string[] {
  const k = axisOf(data, 'kPerNm');
  const kIndex = need(data, 'densityKIndex');
  const rows = statesOf(data);
  const valleys = need(data, 'valley').values;
  return rows.map(({ row, from, to }) => {
    const valley = valleyWords(valleys[Math.floor((row * valleys.length) / rows.length)] ?? 0);
    const at = from < to ? formatQuantity(k[kIndex.values[from] as number] ?? 0, '1/nm') : 'no level';
    return `k = ${at}, ${valley}`;
  });
}

function statesOf(data: ResultData): { row: number; from: number; to: number }[] {
  const kIndex = need(data, 'densityKIndex');
  const count = kIndex.ragged ? need(data, kIndex.ragged).values.length - 1 : kIndex.values.length;
  return Array.from({ length: count }, (_, row) => {
    const [from, to] = rowBounds(data, kIndex, row);
    return { row, from, to };
  });
}

/**
 * Densities across the width of all levels at one k, each standing on its energy: sublattice A solid, B dashed, each drawn
 * to the same height.
 */
export function buildRibbonDensity(data: ResultData, state = 0): BuiltPlot {
  const across = Array.from(need(data, 'positionNm').values, Number);
  const a = need(data, 'densityA').values;
  const b = need(data, 'densityB').values;
  const energies = need(data, 'densityEnergyEv').values;
  const states = statesOf(data);
  const { from, to } = states[Math.min(state, states.length - 1)] ?? { from: 0, to: 0 };
  const n = across.length;
  const levels = Array.from({ length: to - from }, (_, i) => from + i).sort(
    (p, q) => (energies[p] as number) - (energies[q] as number),
  );
  const spacing = typicalSpacing(levels.map((level) => energies[level] as number));
  // an edge state is many times higher than a state of the bulk: each level has a height of its own
  const lifts = new Map(
    levels.map((level) => {
      const most = Math.max(...[a, b].flatMap((values) => across.map((_, i) => values[level * n + i] as number)));
      return [level, most > 0 ? (0.9 * spacing) / most : 0];
    }),
  );
  const height = (values: ArrayLike<number>, level: number, i: number) =>
    (energies[level] as number) + (lifts.get(level) ?? 0) * (values[level * n + i] as number);
  const curve = (values: ArrayLike<number>, level: number) => across.map((_, i) => height(values, level, i));
  const marks: Mark[] = levels.flatMap((level): Mark[] => [
    { kind: 'rule', role: 'closed', across: 'y', at: energies[level] as number },
    { kind: 'line', role: 'ink', x: across, y: curve(a, level), width: 1.4 },
    { kind: 'line', role: 'ink', x: across, y: curve(b, level), width: 1.4, dashed: true },
  ]);
  const [low, high] = rangeOf([levels.map((level) => energies[level] as number)], [-0.1, 0.1], 0);
  const unit = need(data, 'densityA').unit;
  return {
    plot: {
      caption: `Density across the width of ${levels.length} levels at ${densityStates(data)[state] ?? 'one k'}, each on its energy and to a height of its own; sublattice A solid, B dashed.`,
      x: { symbol: 'u', unit: 'nm', domain: domainOf(across) },
      y: { symbol: 'E', unit: 'eV', domain: [low - 0.4 * spacing, high + 1.1 * spacing] },
      marks,
    },
    targets: {
      x: levels.flatMap(() => across),
      y: levels.flatMap((level) => across.map((_, i) => Math.max(height(a, level, i), height(b, level, i)))),
      describe(i) {
        const at = (levels[Math.floor(i / n)] as number) * n + (i % n);
        return {
          value: formatQuantity((a[at] as number) + (b[at] as number), unit),
          description: 'density of both sublattices',
          rows: [
            {
              symbol: 'E',
              label: 'energy',
              value: formatQuantity(energies[levels[Math.floor(i / n)] as number] as number, 'eV'),
            },
            { symbol: 'u', label: 'from the centre', value: formatQuantity(across[i % n] as number, 'nm') },
            { label: 'on A', value: formatQuantity(a[at] as number, unit) },
            { label: 'on B', value: formatQuantity(b[at] as number, unit) },
          ],
        };
      },
    },
    table: {
      columns: [
        { label: 'E', unit: 'eV' },
        { label: 'u', unit: 'nm' },
        { label: 'density on A', unit },
        { label: 'density on B', unit },
      ],
      rows: levels.length * n,
      cell(row, column) {
        const level = levels[Math.floor(row / n)] as number;
        const at = level * n + (row % n);
        return [energies[level], across[row % n], a[at], b[at]][column] as number;
      },
    },
  };
}

/** The median distance of neighbours, so that one close pair does not flatten all curves. */
function typicalSpacing(energies: readonly number[]): number {
  const gaps = energies
    .slice(1)
    .map((energy, i) => energy - (energies[i] as number))
    .filter((gap) => gap > 1e-6)
    .sort((p, q) => p - q);
  return gaps[Math.floor(gaps.length / 2)] ?? 0.05;
}
