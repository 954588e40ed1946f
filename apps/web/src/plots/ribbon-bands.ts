import { formatQuantity, formatSize, type LineMark, type Mark, type PointsMark, type Role } from '@nightcone/drawing';
import { type BuiltPlot, domainOf, rangeOf } from './built-plot.ts';
import { isEmptyRibbon, landauLevel, magneticLengthNm, ribbonWidthNm, transverseWaveNumbers } from './closed-forms.ts';
import { joinLevels, type LevelRef } from './join-levels.ts';
import { axisOf, isValid, kindOf, member, need, numberOf, type ResultData, rowBounds } from './result-data.ts';

/** Two levels closer than this (eV) are drawn as a degenerate pair of valleys. */
const splitDrawnEv = 0.0012;

type Valley = 'K' | 'K-prime' | 'pair-lower' | 'pair-upper' | 'mixed';

/** Which valleys the blocks of rows belong to: one each, or both at once for an armchair edge. */
function valleyBlocks(data: ResultData): ('K' | 'K-prime' | 'both')[] {
  const signs = data.arrays.get('valley')?.values;
  if (signs) return Array.from(signs, (sign) => (sign > 0 ? 'K' : sign < 0 ? 'K-prime' : 'both'));
  if (kindOf(data.body.parameters.edge) === 'armchair') return ['both'];
  const valleys = data.body.parameters.valleys;
  return valleys === 'both' ? ['K', 'K-prime'] : [valleys === 'K-prime' ? 'K-prime' : 'K'];
}

/** Subbands E(k): K solid, K′ dashed, ink where the edge mixes the valleys, closed forms in grey below. */
export function buildRibbonBands(data: ResultData): BuiltPlot {
  const axis = axisOf(data, 'kPerNm');
  const energies = need(data, 'energies');
  const slopes = need(data, 'velocities').values;
  const blocks = valleyBlocks(data);
  const marks: Mark[] = [];
  const valleyOf: Valley[] = new Array(energies.values.length);
  const shown: { k: number; at: number; block: number; row: number }[] = [];
  blocks.forEach((block, b) => {
    const bounds = (row: number) => rowBounds(data, energies, b * axis.length + row);
    for (let row = 0; row < axis.length; row++) {
      const [from, to] = bounds(row);
      for (let at = from; at < to; at++) {
        valleyOf[at] = block === 'both' ? mixedValley(data, energies.values, at, from, to) : block;
        shown.push({ k: axis[row] as number, at, block: b, row });
      }
    }
    for (const line of joinLevels({ axis, energies: energies.values, slopes, bounds }))
      marks.push(...drawLine(line, axis, energies.values, slopes, valleyOf));
  });
  const yDomain = energyDomain(data, energies.values);
  const closed = closedForms(data, axis, yDomain);
  const error = data.arrays.get('errorEstimate')?.values;
  const errorAt = (at: number) => (error && isValid(data, 'errorEstimate', at) ? error[at] : undefined);
  const weights = data.arrays.get('valleyWeight')?.values;
  const numbers = data.arrays.get('levelIndex')?.values;
  return {
    plot: {
      caption: caption(data, axis.length),
      x: { symbol: 'k', unit: '1/nm', domain: domainOf(axis) },
      y: { symbol: 'E', unit: 'eV', domain: yDomain },
      marks: [...closed.marks, ...marks.sort(byRole), ...edgeMarkers(data)],
      ...(closed.labels.length > 0 ? { side: { title: 'n', labels: closed.labels } } : {}),
      key: keyOf(marks, closed.marks.length > 0),
    },
    targets: {
      x: shown.map(({ k }) => k),
      y: shown.map(({ at }) => energies.values[at] as number),
      describe(i) {
        const { k, at, row, block } = shown[i] as (typeof shown)[number];
        const energy = energies.values[at] as number;
        const [from] = rowBounds(data, energies, block * axis.length + row);
        const near = nearestLabel(closed.labels, energy);
        const estimate = errorAt(at);
        return {
          value: formatQuantity(energy, 'eV', estimate),
          description: `${valleyWords(valleyOf[at] as Valley)}, level ${numbers ? `n = ${numbers[at]}` : `${at - from + 1} at this k`}`,
          rows: [
            { symbol: 'k', label: 'wave number', value: formatQuantity(k, '1/nm') },
            { symbol: 'dE/dk', label: 'slope', value: formatQuantity(slopes[at] as number, 'eV nm') },
            ...(weights ? [{ label: 'share of K', value: (weights[at] as number).toFixed(3) }] : []),
            ...(near
              ? [{ label: `above Landau n = ${near.text}`, value: formatQuantity(energy - near.at, 'eV') }]
              : []),
            ...(estimate === undefined ? [] : [{ label: 'error estimate', value: formatSize(estimate, 'eV') }]),
          ],
        };
      },
    },
    table: {
      columns: [
        { label: 'valley', unit: '' },
        { label: 'k', unit: '1/nm' },
        { label: 'E', unit: 'eV' },
        { label: 'dE/dk', unit: 'eV nm' },
        { label: 'error', unit: 'eV' },
      ],
      rows: shown.length,
      cell(row, column) {
        const { k, at } = shown[row] as (typeof shown)[number];
        return [valleyWords(valleyOf[at] as Valley), k, energies.values[at], slopes[at], errorAt(at) ?? ''][column] as
          | number
          | string;
      },
    },
  };
}

const order: Role[] = ['closed', 'mixed', 'ink', 'K', 'K-prime'];
const byRole = (a: Mark, b: Mark) =>
  a.kind === 'cells' || b.kind === 'cells' ? 0 : order.indexOf(a.role) - order.indexOf(b.role);

/** An armchair edge mixes the valleys: colour only where a strain gauge parts them or where two levels coincide. */
function mixedValley(data: ResultData, energies: ArrayLike<number>, at: number, from: number, to: number): Valley {
  const weight = data.arrays.get('valleyWeight')?.values[at];
  if (weight !== undefined && weight > 0.9) return 'K';
  if (weight !== undefined && weight < 0.1) return 'K-prime';
  const here = energies[at] as number;
  const above = at + 1 < to ? (energies[at + 1] as number) - here : Number.POSITIVE_INFINITY;
  const below = at > from ? here - (energies[at - 1] as number) : Number.POSITIVE_INFINITY;
  if (Math.min(above, below) >= splitDrawnEv) return 'mixed';
  return above <= below ? 'pair-lower' : 'pair-upper';
}

const roleOf: Record<Valley, Role> = {
  K: 'K',
  'K-prime': 'K-prime',
  'pair-lower': 'K',
  'pair-upper': 'K-prime',
  mixed: 'mixed',
};
const valleyWords = (valley: Valley): string =>
  ({
    K: 'valley K',
    'K-prime': 'valley K′',
    'pair-lower': 'both valleys',
    'pair-upper': 'both valleys',
    mixed: 'valleys mixed',
  })[valley];

/** One joined level as lines of one role each; runs overlap by one point so that no gap opens. */
function drawLine(
  line: LevelRef[],
  axis: readonly number[],
  energies: ArrayLike<number>,
  slopes: ArrayLike<number>,
  valleys: readonly Valley[],
): (LineMark | PointsMark)[] {
  const role = (ref: LevelRef) => roleOf[valleys[ref.at] as Valley];
  const isPair = (ref: LevelRef) => (valleys[ref.at] as Valley).startsWith('pair');
  if (line.length === 1) {
    const ref = line[0] as LevelRef;
    return [{ kind: 'points', role: role(ref), x: [axis[ref.row] as number], y: [energies[ref.at] as number] }];
  }
  const marks: LineMark[] = [];
  let start = 0;
  for (let i = 1; i <= line.length; i++) {
    const first = line[start] as LevelRef;
    const here = line[i];
    const same = here && (role(here) === role(first) || (isPair(here) && isPair(first)));
    if (same) continue;
    const part = line.slice(start, Math.min(i + 1, line.length));
    if (part.length > 1)
      marks.push({
        kind: 'line',
        role: role(first),
        x: part.map((ref) => axis[ref.row] as number),
        y: part.map((ref) => energies[ref.at] as number),
        slopes: part.map((ref) => slopes[ref.at] as number),
      });
    start = i;
  }
  return marks;
}

function energyDomain(data: ResultData, energies: ArrayLike<number>): [number, number] {
  const spectrum = data.body.parameters.spectrum;
  if (kindOf(spectrum) === 'window')
    return [numberOf(member(spectrum, 'eMin'), -0.3), numberOf(member(spectrum, 'eMax'), 0.3)];
  return rangeOf([energies], [-0.1, 0.1]);
}

function closedForms(data: ResultData, axis: readonly number[], [low, high]: [number, number]) {
  const { parameters } = data.body;
  const field = numberOf(parameters.fieldT);
  const velocity = numberOf(parameters.diracVelocityEvNm, 0.5751);
  const marks: Mark[] = [];
  const labels: { at: number; text: string }[] = [];
  if (!isEmptyRibbon(parameters)) return { marks, labels };
  const width = ribbonWidthNm(parameters);
  // an orbit and its neighbour fit from about four magnetic lengths on; narrower, the ladder says nothing
  if (field !== 0 && width > 4 * magneticLengthNm(field)) {
    for (let n = -400; n <= 400; n++) {
      const energy = landauLevel(n, field, velocity);
      if (energy < low || energy > high) continue;
      marks.push({ kind: 'rule', role: 'closed', across: 'y', at: energy });
      labels.push({ at: energy, text: String(n).replace('-', '−') });
    }
  } else if (field === 0) {
    for (const q of transverseWaveNumbers(parameters, Math.max(Math.abs(low), Math.abs(high))))
      for (const sign of [-1, 1]) {
        const y = axis.map((k) => sign * velocity * Math.hypot(k, q));
        if (y.some((energy) => energy >= low && energy <= high))
          marks.push({ kind: 'line', role: 'closed', x: axis, y, width: 1 });
      }
  }
  return { marks, labels };
}

/** Where the guiding centre of an orbit meets the edge: k = ± W / 2l². */
function edgeMarkers(data: ResultData): Mark[] {
  const field = numberOf(data.body.parameters.fieldT);
  if (field === 0 || kindOf(data.body.parameters.edge) === 'periodic') return [];
  const k = ribbonWidthNm(data.body.parameters) / (2 * magneticLengthNm(field) ** 2);
  return [-k, k].map((at) => ({ kind: 'rule', role: 'marker', across: 'x', at, label: 'edge', dotted: true }));
}

function keyOf(marks: readonly Mark[], closed: boolean) {
  const has = (role: Role) => marks.some((mark) => mark.kind !== 'cells' && mark.role === role);
  return [
    ...(has('K') ? [{ role: 'K' as const, label: 'K', mark: 'line' as const }] : []),
    ...(has('K-prime') ? [{ role: 'K-prime' as const, label: 'K′', mark: 'line' as const }] : []),
    ...(has('mixed') ? [{ role: 'mixed' as const, label: 'valleys mixed by the edge', mark: 'line' as const }] : []),
    ...(closed ? [{ role: 'closed' as const, label: 'closed form', mark: 'line' as const }] : []),
  ];
}

const nearestLabel = (labels: readonly { at: number; text: string }[], energy: number) =>
  labels.reduce<{ at: number; text: string } | undefined>(
    (best, label) => (!best || Math.abs(label.at - energy) < Math.abs(best.at - energy) ? label : best),
    undefined,
  );

const edgeWords: Record<string, string> = {
  armchair: 'an armchair',
  zigzag: 'a zigzag',
  'infinite-mass': 'an infinite-mass',
  periodic: 'a periodic',
};

function caption(data: ResultData, count: number): string {
  const field = numberOf(data.body.parameters.fieldT);
  const edge = edgeWords[kindOf(data.body.parameters.edge)] ?? 'a';
  const width = formatQuantity(ribbonWidthNm(data.body.parameters), 'nm');
  return `Subbands of ${edge} ribbon, ${width} wide${field === 0 ? '' : `, at ${formatQuantity(field, 'T')}`}, at ${count} k.`;
}
