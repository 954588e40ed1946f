import { formatQuantity } from '@nightcone/drawing';
import { type BuiltPlot, domainOf, rangeOf } from './built-plot.ts';
import { buildGridMap } from './grid-map.ts';
import { axisOf, isValid, need, type ResultData } from './result-data.ts';

interface OverEnergy {
  array: string;
  label: string;
  symbol: string;
  words: string;
  signed?: boolean;
}

export const buildLandauDensity = (data: ResultData) =>
  buildOverEnergy(data, {
    array: 'density',
    label: 'density of states',
    symbol: '\\rho',
    words: 'Density of states of the listed levels, all spins and valleys of the question counted',
  });

export const buildHallPlateaus = (data: ResultData) =>
  buildOverEnergy(data, {
    array: 'hallPlateaus',
    label: 'Hall conductivity',
    symbol: '\\sigma_{xy}',
    words: 'Hall plateaus of sharp levels at zero temperature with the Fermi energy at E',
    signed: true,
  });

/** An array over field and energy as a map; one field or one energy alone as a line. Absent entries stay empty. */
function buildOverEnergy(
  data: ResultData,
  { array, label: quantity, symbol: letter, words, signed }: OverEnergy,
): BuiltPlot {
  const fields = axisOf(data, 'fieldT');
  const energies = axisOf(data, 'energyEv');
  const found = need(data, array);
  const unit = found.unit;
  const values = Array.from(found.values, (value, i) => (isValid(data, array, i) ? Number(value) : Number.NaN));
  if (fields.length > 1 && energies.length > 1)
    return buildGridMap({
      caption: `${words}.`,
      x: { symbol: 'B', label: 'magnetic field', unit: 'T', values: fields },
      y: { symbol: 'E', label: 'energy', unit: 'eV', values: energies },
      z: { symbol: letter, label: quantity, unit },
      values,
      ...(signed ? { signed } : {}),
    });
  const along = fields.length > 1 ? fields : energies;
  const [symbol, axisUnit, label] = fields.length > 1 ? ['B', 'T', 'magnetic field'] : ['E', 'eV', 'energy'];
  const y = values;
  return {
    plot: {
      caption: `${words}.`,
      x: { symbol: symbol as string, unit: axisUnit as string, domain: domainOf(along) },
      y: { symbol: letter, unit, domain: rangeOf([y, [0]], [0, 1]) },
      marks: [{ kind: 'line', role: 'ink', x: along, y }],
    },
    targets: {
      x: along,
      y,
      describe: (i) => ({
        value: formatQuantity(y[i] as number, unit),
        description: quantity,
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
        { label: quantity, unit },
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
