import { formatQuantity } from '@nightcone/drawing';
import { type BuiltPlot, domainOf, rangeOf } from './built-plot.ts';
import { buildGridMap } from './grid-map.ts';
import { axisOf, isValid, need, type ResultData } from './result-data.ts';

/** Broadened density of states over field and energy; one field alone as a line. */
export function buildLandauDensity(data: ResultData): BuiltPlot {
  const fields = axisOf(data, 'fieldT');
  const energies = axisOf(data, 'energyEv');
  const density = need(data, 'density');
  const unit = density.unit || '1/(eV nm²)';
  if (fields.length > 1 && energies.length > 1)
    return buildGridMap({
      caption: 'Density of states over field and energy, all spins and valleys of the question counted.',
      x: { symbol: 'B', label: 'magnetic field', unit: 'T', values: fields },
      y: { symbol: 'E', label: 'energy', unit: 'eV', values: energies },
      z: { symbol: 'D', label: 'density of states', unit },
      values: density.values,
    });
  const along = fields.length > 1 ? fields : energies;
  const [symbol, axisUnit, label] = fields.length > 1 ? ['B', 'T', 'magnetic field'] : ['E', 'eV', 'energy'];
  const y = Array.from(density.values, Number);
  return {
    plot: {
      caption: 'Density of states, all spins and valleys of the question counted.',
      x: { symbol: symbol as string, unit: axisUnit as string, domain: domainOf(along) },
      y: { symbol: 'D', unit, domain: rangeOf([y, [0]], [0, 1]) },
      marks: [{ kind: 'line', role: 'ink', x: along, y }],
    },
    targets: {
      x: along,
      y,
      describe: (i) => ({
        value: formatQuantity(y[i] as number, unit),
        description: 'density of states',
        rows: [
          {
            symbol: symbol as string,
            label: label as string,
            value: formatQuantity(along[i] as number, axisUnit as string),
          },
        ],
      }),
    },
    table: {
      columns: [
        { label: label as string, unit: axisUnit as string },
        { label: 'density of states', unit },
      ],
      rows: along.length,
      cell: (row, column) => (column === 0 ? along[row] : y[row]) as number,
    },
  };
}

/** Fermi energy over field and carrier density, where it exists; one field or one density alone as a line. */
export function buildFermiEnergy(data: ResultData): BuiltPlot {
  const fields = axisOf(data, 'fieldT');
  const carriers = axisOf(data, 'carrierPerNm2');
  const array = need(data, 'fermiEnergy');
  const values = Array.from(array.values, (value, i) => (isValid(data, 'fermiEnergy', i) ? Number(value) : Number.NaN));
  if (fields.length > 1 && carriers.length > 1)
    return buildGridMap({
      caption: 'Fermi energy over field and carrier density.',
      x: { symbol: 'B', label: 'magnetic field', unit: 'T', values: fields },
      y: { symbol: 'n_e', label: 'carrier density', unit: '1/nm²', values: carriers },
      z: { symbol: 'E_F', label: 'Fermi energy', unit: 'eV' },
      values,
      signed: true,
    });
  const overField = fields.length > 1;
  const along = overField ? fields : carriers;
  const unit = overField ? 'T' : '1/nm²';
  const label = overField ? 'magnetic field' : 'carrier density';
  return {
    plot: {
      caption: `Fermi energy against ${label}.`,
      x: { symbol: overField ? 'B' : 'n_e', unit, domain: domainOf(along) },
      y: { symbol: 'E_F', unit: 'eV', domain: rangeOf([values], [-0.1, 0.1]) },
      marks: [{ kind: 'line', role: 'ink', x: along, y: values }],
    },
    targets: {
      x: along,
      y: values,
      describe: (i) => ({
        value: formatQuantity(values[i] as number, 'eV'),
        description: 'Fermi energy',
        rows: [{ symbol: overField ? 'B' : 'n_e', label, value: formatQuantity(along[i] as number, unit) }],
      }),
    },
    table: {
      columns: [
        { label, unit },
        { label: 'Fermi energy', unit: 'eV' },
      ],
      rows: along.length,
      cell: (row, column) => (column === 0 ? along[row] : values[row]) as number,
    },
  };
}
