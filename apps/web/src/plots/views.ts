import { buildLandauFan } from './landau-fan.ts';
import { buildFermiEnergy, buildHallPlateaus, buildLandauDensity } from './landau-maps.ts';
import { buildRibbonBands } from './ribbon-bands.ts';
import { buildRibbonChannels } from './ribbon-channels.ts';
import { buildRibbonDensity, densityStates } from './ribbon-density.ts';
import type { View, ViewedArray } from './view.ts';
import { viewsByDims } from './views-by-dims.ts';

const byModel: Record<string, readonly View[]> = {
  'landau-levels': [
    {
      id: 'fan',
      label: 'levels',
      needs: ['energies'],
      optional: ['energiesValid', 'energyErrorEv', 'levelIndex', 'fieldT'],
      build: buildLandauFan,
    },
    {
      id: 'density',
      label: 'density of states',
      needs: ['density'],
      optional: ['densityValid', 'fieldT', 'energyEv'],
      build: buildLandauDensity,
    },
    {
      id: 'hall',
      label: 'Hall plateaus',
      needs: ['hallPlateaus'],
      optional: ['hallPlateausValid', 'fieldT', 'energyEv'],
      build: buildHallPlateaus,
    },
    {
      id: 'filling',
      label: 'Fermi energy',
      needs: ['fermiEnergy'],
      optional: ['fermiEnergyValid', 'fieldT', 'carrierPerNm2'],
      build: buildFermiEnergy,
    },
  ],
  'continuum-ribbon': [
    {
      id: 'bands',
      label: 'subbands',
      needs: ['energies', 'velocities'],
      optional: ['errorEstimate', 'errorEstimateValid', 'valleyWeight', 'levelIndex', 'valley', 'kPerNm'],
      build: buildRibbonBands,
    },
    {
      id: 'density',
      label: 'densities',
      needs: ['densityA', 'densityB', 'positionNm', 'densityEnergyEv', 'densityKIndex', 'valley'],
      optional: ['kPerNm'],
      choices: { label: 'levels at', list: densityStates },
      build: buildRibbonDensity,
    },
    {
      id: 'channels',
      label: 'channels',
      needs: ['channels'],
      optional: ['channelsValid', 'energyEv'],
      build: buildRibbonChannels,
    },
  ],
};

/** The views that a result with these arrays can show. An empty array (no states asked for) is no view. */
export function viewsOf(model: string, arrays: readonly ViewedArray[]): View[] {
  const filled = new Set(
    arrays.filter((array) => array.shape.every((length) => length > 0)).map((array) => array.name),
  );
  const own = byModel[model];
  if (!own) return viewsByDims(model, arrays);
  return own.filter((view) => view.needs.every((name) => filled.has(name)));
}

/** Names of the arrays to load for a view: needs, optional ones that exist, and offsets of ragged ones. */
export function arraysOf(view: View, arrays: readonly { name: string; ragged?: string | undefined }[]): string[] {
  const wanted = arrays.filter(({ name }) => view.needs.includes(name) || view.optional.includes(name));
  return [...new Set(wanted.flatMap(({ name, ragged }) => (ragged ? [name, ragged] : [name])))];
}
