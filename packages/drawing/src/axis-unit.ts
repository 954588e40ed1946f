/** Units of axes: prefixes by powers of ten. Nothing here enters a hash. */

export interface DisplayUnit {
  /** shown value = stored value × factor */
  factor: number;
  unit: string;
}

/** Prefixed forms of the stored units, smallest first: used below `below` stored units. */
const prefixed: Record<string, { below: number; factor: number; unit: string }[]> = {
  eV: [
    { below: 1e-3, factor: 1e6, unit: 'µeV' },
    { below: 1, factor: 1e3, unit: 'meV' },
  ],
  'eV nm': [{ below: 0.1, factor: 1e3, unit: 'meV nm' }],
  'eV/nm': [{ below: 1, factor: 1e3, unit: 'meV/nm' }],
  T: [{ below: 0.1, factor: 1e3, unit: 'mT' }],
  nm: [{ below: 0.01, factor: 1e3, unit: 'pm' }],
};

/** The unit in which values up to `largest` (absolute, stored units) are read most easily. */
export function displayUnit(unit: string, largest: number): DisplayUnit {
  const size = Math.abs(largest);
  // far below the smallest prefix a power of ten reads better: 2.9e−10 eV
  const found = size > 1e-9 ? prefixed[unit]?.find((candidate) => size < candidate.below) : undefined;
  return found ? { factor: found.factor, unit: found.unit } : { factor: 1, unit };
}
