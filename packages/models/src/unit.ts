/** A unit as powers of base units and a power of ten, e.g. `1/Å` = nm⁻¹ · 10¹. */
export interface Unit {
  /** Exponent by base unit, zero exponents left out, in a fixed order: `eV:1 nm:-1`. */
  dimension: string;
  powerOfTen: number;
}

/** What a name stands for: base unit and power of ten. Units that are no power of ten of these do not exist here. */
const names: Record<string, [base: string, powerOfTen: number]> = {
  eV: ['eV', 0],
  meV: ['eV', -3],
  µeV: ['eV', -6],
  neV: ['eV', -9],
  keV: ['eV', 3],
  nm: ['nm', 0],
  pm: ['nm', -3],
  Å: ['nm', -1],
  µm: ['nm', 3],
  mm: ['nm', 6],
  cm: ['nm', 7],
  m: ['nm', 9],
  T: ['T', 0],
  mT: ['T', -3],
  µT: ['T', -6],
  kT: ['T', 3],
  K: ['K', 0],
  mK: ['K', -3],
  deg: ['deg', 0],
  '°': ['deg', 0],
  rad: ['rad', 0],
  mrad: ['rad', -3],
};

/** Units offered in a message, by the unit of the field. */
const offered: Record<string, string[]> = {
  eV: ['eV', 'meV', 'µeV'],
  nm: ['nm', 'Å', 'µm'],
  '1/nm': ['1/nm', '1/Å', '1/µm'],
  '1/nm²': ['1/nm²', '1/cm²', '1/µm²'],
  T: ['T', 'mT'],
  K: ['K', 'mK'],
  'eV nm': ['eV nm', 'meV nm', 'eV Å'],
  'eV/nm': ['eV/nm', 'meV/nm', 'eV/Å'],
  deg: ['deg', '°'],
  rad: ['rad', 'mrad'],
};

const superscripts: Record<string, string> = { '⁻': '-', '⁰': '0', '¹': '1', '²': '2', '³': '3', '⁴': '4' };

/** Spellings that mean the same sign: Greek mu, the ångström sign, `u`, `^`, middle dots. */
function normalise(text: string): string {
  return text
    .trim()
    .replace(/[⁻⁰¹²³⁴]/g, (sign) => superscripts[sign] ?? '')
    .replaceAll('μ', 'µ')
    .replaceAll('\u212b', 'Å')
    .replaceAll('A\u030a', 'Å')
    .replace(/\bu(?=(eV|m|T)\b)/g, 'µ')
    .replace(/\bAng(strom)?\b/gi, 'Å')
    .replace(/[·*]/g, ' ')
    .replaceAll('^', '');
}

/** Reads `eV`, `1/nm²`, `cm^-2`, `eV·nm`, `meV/Å` …; undefined for a text that is no unit. '' is dimensionless. */
export function parseUnit(text: string): Unit | undefined {
  const parts = normalise(text).split('/');
  if (parts.length > 2) return undefined;
  const exponents = new Map<string, number>();
  let powerOfTen = 0;
  for (const [index, part] of parts.entries()) {
    const factors = part.replaceAll(/[()]/g, '').split(/\s+/).filter(Boolean);
    if (index === 1 && factors.length === 0) return undefined;
    for (const factor of factors) {
      if (factor === '1' && index === 0) continue;
      const [, name = '', power = '1'] = /^([^\d-]+)(-?\d)?$/.exec(factor) ?? [];
      const known = Object.hasOwn(names, name) ? names[name] : undefined;
      if (known === undefined) return undefined;
      const exponent = Number(power) * (index === 0 ? 1 : -1);
      exponents.set(known[0], (exponents.get(known[0]) ?? 0) + exponent);
      powerOfTen += known[1] * exponent;
    }
  }
  const dimension = [...exponents]
    .filter(([, exponent]) => exponent !== 0)
    .map(([base, exponent]) => `${base}:${exponent}`)
    .sort()
    .join(' ');
  return { dimension, powerOfTen };
}

/** Units in which a field of this unit may be typed, its own first. */
export function allowedUnits(unit: string): string[] {
  return offered[unit] ?? (unit === '' ? [] : [unit]);
}
