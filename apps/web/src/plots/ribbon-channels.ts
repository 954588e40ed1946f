import { formatNumber, formatQuantity } from '@nightcone/drawing';
import { type BuiltPlot, domainOf } from './built-plot.ts';
import { axisOf, isValid, need, type ResultData } from './result-data.ts';

/** Open channels against energy, as a staircase; only where the kernel could prove the count. */
export function buildRibbonChannels(data: ResultData): BuiltPlot {
  const energies = axisOf(data, 'energyEv');
  const channels = need(data, 'channels').values;
  const valid = energies.map((_, i) => isValid(data, 'channels', i));
  const x: number[] = [];
  const y: number[] = [];
  energies.forEach((energy, i) => {
    const here = valid[i] ? (channels[i] as number) : Number.NaN;
    if (i > 0 && here !== y.at(-1)) {
      const middle = (energy + (energies[i - 1] as number)) / 2;
      x.push(middle, middle);
      y.push(y.at(-1) as number, here);
    }
    x.push(energy);
    y.push(here);
  });
  const most = Math.max(1, ...Array.from(channels, Number));
  const proved = valid.filter(Boolean).length;
  return {
    plot: {
      caption: `Open channels, spin counted; proved at ${proved} of ${energies.length} energies.`,
      x: { symbol: 'E', unit: 'eV', domain: domainOf(energies) },
      y: { symbol: 'M', unit: '', domain: [0, most + 0.5], integer: true },
      marks: [{ kind: 'line', role: 'ink', x, y }],
    },
    targets: {
      x: energies.filter((_, i) => valid[i]),
      y: Array.from(channels, Number).filter((_, i) => valid[i]),
      describe(i) {
        const at = valid.flatMap((good, index) => (good ? [index] : []))[i] as number;
        return {
          value: `${formatNumber(channels[at] as number)} open`,
          description: 'right-moving modes, spin counted',
          rows: [{ symbol: 'E', label: 'energy', value: formatQuantity(energies[at] as number, 'eV') }],
        };
      },
    },
    table: {
      columns: [
        { label: 'E', unit: 'eV' },
        { label: 'channels', unit: '' },
      ],
      rows: energies.length,
      cell: (row, column) =>
        column === 0 ? (energies[row] as number) : valid[row] ? (channels[row] as number) : 'not proved',
    },
  };
}
