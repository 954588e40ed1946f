import { formatQuantity, type Mark } from '@nightcone/drawing';
import { type BuiltPlot, domainOf, rangeOf } from './built-plot.ts';
import { landauLevel } from './closed-forms.ts';
import { axisOf, isValid, kindOf, member, need, numberOf, type ResultData } from './result-data.ts';

interface Level {
  field: number;
  valley: 'K' | 'K-prime';
  spin: number;
  n: number;
  energy: number;
  error: number | null;
}

/** Level n of column `level`: from the kernel's list, else −N…N. */
function levelNumber(data: ResultData, column: number, count: number): number {
  return data.arrays.get('levelIndex')?.values[column] ?? column - (count - 1) / 2;
}

/** E_n(B): one line for each level, valley and spin; a level that does not exist at a field breaks its line. */
export function buildLandauFan(data: ResultData): BuiltPlot {
  const fields = axisOf(data, 'fieldT');
  const energies = need(data, 'energies');
  const [, valleyCount = 1, spinCount = 1, levelCount = 1] = energies.shape;
  const chosen = data.body.parameters.valleys;
  const valleys: Level['valley'][] = chosen === 'both' ? ['K', 'K-prime'] : [chosen === 'K-prime' ? 'K-prime' : 'K'];
  const errors = data.arrays.get('energyErrorEv')?.values;
  const marks: Mark[] = [];
  const shown: Level[] = [];
  const ends = new Map<number, number>();
  for (let v = 0; v < valleyCount; v++)
    for (let s = 0; s < spinCount; s++)
      for (let l = 0; l < levelCount; l++) {
        const n = levelNumber(data, l, levelCount);
        const valley = valleys[v] ?? 'K';
        const y = fields.map((field, f) => {
          const at = ((f * valleyCount + v) * spinCount + s) * levelCount + l;
          if (!isValid(data, 'energies', at)) return Number.NaN;
          const energy = energies.values[at] as number;
          const error = errors?.[(f * valleyCount + v) * levelCount + l] ?? null;
          shown.push({ field, valley, spin: s, n, energy, error });
          if (f === fields.length - 1) ends.set(n, energy);
          return energy;
        });
        marks.push(
          fields.length > 1
            ? { kind: 'line', role: valley, x: fields, y }
            : { kind: 'points', role: valley, shape: valley === 'K' ? 'dot' : 'open', radius: 2.6, x: fields, y },
        );
      }
  const yDomain = rangeOf([shown.map((level) => level.energy)], [-0.1, 0.1]);
  const closed = closedFan(data, fields, shown);
  return {
    plot: {
      caption: caption(data, fields),
      x: { symbol: 'B', unit: 'T', domain: domainOf(fields) },
      y: { symbol: 'E', unit: 'eV', domain: yDomain },
      marks: [...closed, ...marks],
      side: {
        title: 'n',
        labels: [...ends].map(([n, at]) => ({ at, text: String(n).replace('-', '−') })),
      },
      key: [
        ...(valleys.includes('K') ? [{ role: 'K' as const, label: 'K', mark: 'line' as const }] : []),
        ...(valleys.includes('K-prime') ? [{ role: 'K-prime' as const, label: 'K′', mark: 'line' as const }] : []),
        ...(closed.length > 0 ? [{ role: 'closed' as const, label: 'closed form', mark: 'line' as const }] : []),
      ],
    },
    targets: {
      x: shown.map((level) => level.field),
      y: shown.map((level) => level.energy),
      describe(i) {
        const level = shown[i] as Level;
        return {
          value: formatQuantity(level.energy, 'eV', level.error),
          description: `level n = ${level.n}, ${level.valley === 'K' ? 'valley K' : 'valley K′'}${spinWords(spinCount, level.spin)}`,
          rows: [
            { symbol: 'B', label: 'magnetic field', value: formatQuantity(level.field, 'T') },
            ...(level.field !== 0 && level.n !== 0
              ? [
                  {
                    label: 'E/√B',
                    value: `${formatQuantity(level.energy / Math.sqrt(Math.abs(level.field)), 'eV')}/√T`,
                  },
                ]
              : []),
          ],
        };
      },
    },
    table: {
      columns: [
        { label: 'B', unit: 'T' },
        { label: 'valley', unit: '' },
        { label: 'spin', unit: '' },
        { label: 'n', unit: '' },
        { label: 'E', unit: 'eV' },
        { label: 'error', unit: 'eV' },
      ],
      rows: shown.length,
      cell(row, column) {
        const level = shown[row] as Level;
        return [level.field, level.valley, level.spin, level.n, level.energy, level.error ?? ''][column] as
          | number
          | string;
      },
    },
  };
}

const spinWords = (count: number, spin: number) => (count < 2 ? '' : spin === 0 ? ', spin up' : ', spin down');

/** The ladder of one cone, where the levels shown were not taken from it: another method, or a crossed field. */
function closedFan(data: ResultData, fields: readonly number[], shown: readonly Level[]): Mark[] {
  const { system, diracVelocityEvNm, spin } = data.body.parameters;
  const method = kindOf(data.body.numerics.method);
  const simple = kindOf(system) === 'monolayer' && kindOf(spin) !== 'zeeman';
  if (!simple || !['ladder', 'grid'].includes(method) || numberOf(member(system, 'electricFieldEvPerNm')) !== 0)
    return [];
  const numbers = [...new Set(shown.map((level) => level.n))];
  const mass = numberOf(member(system, 'massEv'));
  return numbers.map((n) => ({
    kind: 'line',
    role: 'closed',
    width: 1,
    x: fields,
    y: fields.map((field) => landauLevel(n, field, numberOf(diracVelocityEvNm, 0.5751), mass)),
  }));
}

function caption(data: ResultData, fields: readonly number[]): string {
  const layers = kindOf(data.body.parameters.system) === 'bilayer' ? 'two layers' : 'one layer';
  const [from, to] = [fields[0] ?? 0, fields.at(-1) ?? 0];
  return fields.length > 1
    ? `Landau levels of ${layers} against the field, ${formatQuantity(from, 'T')} to ${formatQuantity(to, 'T')}.`
    : `Landau levels of ${layers} at ${formatQuantity(from, 'T')}.`;
}
