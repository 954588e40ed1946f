import { formatQuantity } from '@nightcone/drawing';
import { type BuiltPlot, domainOf, rangeOf } from './built-plot.ts';
import { axisOf, need, type ResultData } from './result-data.ts';

/**
 * Densities across the width of the states asked for: sublattice A solid, B dashed on the same ground, one curve for
 * every state, shifted so that each stands on its own line.
 */
export function buildRibbonDensity(data: ResultData): BuiltPlot {
  const a = need(data, 'densityA');
  const b = need(data, 'densityB');
  const across = need(data, 'positionNm').values;
  const points = a.shape.at(-1) ?? across.length;
  const states = Math.floor(a.values.length / Math.max(1, points));
  const total = (state: number, i: number) =>
    (a.values[state * points + i] as number) + (b.values[state * points + i] as number);
  const most = rangeOf(
    [Float64Array.from({ length: states * points }, (_, i) => total(Math.floor(i / points), i % points))],
    [0, 1],
    0,
  )[1];
  const xs = Array.from({ length: points }, (_, i) => across[i] as number);
  const lift = (state: number) => state * most * 0.55;
  const curve = (values: ArrayLike<number>, state: number) =>
    xs.map((_, i) => lift(state) + (values[state * points + i] as number));
  const energies = data.arrays.get('densityEnergyEv')?.values;
  const k = axisOf(data, 'kPerNm');
  const kIndex = data.arrays.get('densityKIndex')?.values;
  const unit = a.unit || '1/nm';
  return {
    plot: {
      caption: `Density across the width of ${states} states, A solid and B dashed, each lifted above the one before.`,
      x: { symbol: 'u', unit: 'nm', domain: domainOf(xs) },
      y: { symbol: '\\rho', unit, domain: [0, lift(Math.max(0, states - 1)) + most * 1.05] },
      marks: Array.from({ length: states }, (_, state) => state).flatMap((state) => [
        { kind: 'rule' as const, role: 'closed' as const, across: 'y' as const, at: lift(state) },
        { kind: 'line' as const, role: 'K' as const, x: xs, y: curve(a.values, state), width: 1.5 },
        { kind: 'line' as const, role: 'K-prime' as const, x: xs, y: curve(b.values, state), width: 1.5 },
      ]),
      key: [
        { role: 'K', label: 'sublattice A', mark: 'line' },
        { role: 'K-prime', label: 'sublattice B', mark: 'line' },
      ],
    },
    targets: {
      x: Array.from({ length: states * points }, (_, i) => xs[i % points] as number),
      y: Array.from(
        { length: states * points },
        (_, i) => lift(Math.floor(i / points)) + total(Math.floor(i / points), i % points),
      ),
      describe(i) {
        const state = Math.floor(i / points);
        return {
          value: formatQuantity(total(state, i % points), unit),
          description: `state ${state + 1}${kIndex ? ` at k = ${formatQuantity(k[kIndex[state] as number] ?? 0, '1/nm')}` : ''}`,
          rows: [
            { symbol: 'u', label: 'from the centre', value: formatQuantity(xs[i % points] as number, 'nm') },
            { label: 'on A', value: formatQuantity(a.values[i] as number, unit) },
            { label: 'on B', value: formatQuantity(b.values[i] as number, unit) },
            ...(energies
              ? [{ symbol: 'E', label: 'energy', value: formatQuantity(energies[state] as number, 'eV') }]
              : []),
          ],
        };
      },
    },
    table: {
      columns: [
        { label: 'state', unit: '' },
        { label: 'u', unit: 'nm' },
        { label: 'density on A', unit },
        { label: 'density on B', unit },
      ],
      rows: states * points,
      cell: (row, column) =>
        [Math.floor(row / points) + 1, xs[row % points], a.values[row], b.values[row]][column] as number,
    },
  };
}
