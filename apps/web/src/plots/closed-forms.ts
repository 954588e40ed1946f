import type { Json } from '@nightcone/models';
import { kindOf, member, numberOf } from './result-data.ts';

/**
 * Closed forms that are drawn as thin grey lines under computed levels. They are for the eye only: the checks of a
 * certificate are computed by the kernel. Energies in eV, lengths in nm, fields in T.
 */

/** ħ/e in T nm² (exact SI values of 2019). */
const fluxAreaTNm2 = 658.2119569509067;

export const magneticLengthNm = (fieldT: number): number => Math.sqrt(fluxAreaTNm2 / Math.abs(fieldT));

/** E_n = ±√(m² + 2|n|(ħv/l)²), the ladder of one Dirac cone (McClure, Phys. Rev. 104, 666 (1956)). */
export function landauLevel(n: number, fieldT: number, velocityEvNm: number, massEv = 0): number {
  if (fieldT === 0) return Math.sign(n) * Math.abs(massEv);
  const step = velocityEvNm / magneticLengthNm(fieldT);
  return (n < 0 ? -1 : 1) * Math.sqrt(massEv * massEv + 2 * Math.abs(n) * step * step);
}

type Parameters = { [name: string]: Json };

/** Width between the zeros of the wave in nm; the three ways to state it. */
export function ribbonWidthNm(parameters: Parameters): number {
  const width = parameters.width;
  const bond = numberOf(parameters.bondLengthNm, 0.142);
  const count = numberOf(member(width, 'count'));
  if (kindOf(width) === 'nm') return numberOf(member(width, 'widthNm'));
  if (kindOf(width) === 'dimer-lines') return ((count + 1) * Math.sqrt(3) * bond) / 2;
  return (1.5 * count + (member(width, 'rule') === 'geometric' ? 1 : 0.75)) * bond;
}

/** Every transverse profile is absent, so that the closed forms of an empty ribbon apply. */
export const isEmptyRibbon = (parameters: Parameters): boolean =>
  ['potentialEv', 'massEv', 'valleyMassEv', 'gaugePerNm', 'fieldProfileT'].every((name) =>
    ['none', ''].includes(kindOf(parameters[name])),
  ) && kindOf(parameters.spin) !== 'zeeman';

/**
 * Transverse wave numbers of an empty ribbon without field, those with |ħv q| up to `energyEv` (Brey & Fertig, PRB 73,
 * 235411 (2006); Berry & Mondragon, Proc. R. Soc. A 412, 53 (1987)). Empty for zigzag edges, where q depends on k.
 */
export function transverseWaveNumbers(parameters: Parameters, energyEv: number): number[] {
  const width = ribbonWidthNm(parameters);
  const velocity = numberOf(parameters.diracVelocityEvNm, 0.5751);
  const most = Math.ceil((energyEv / velocity) * (width / Math.PI)) + 2;
  const edge = kindOf(parameters.edge);
  const numbers: number[] = [];
  if (edge === 'armchair') {
    const shift = (4 * Math.PI) / (3 * Math.sqrt(3) * numberOf(parameters.bondLengthNm, 0.142));
    const first = Math.round((shift * width) / Math.PI);
    for (let n = first - most; n <= first + most; n++) numbers.push((n * Math.PI) / width - shift);
  } else if (edge === 'infinite-mass') {
    const same = member(parameters.edge, 'lowerSign') === member(parameters.edge, 'upperSign');
    for (let n = same ? 0 : 1; n <= most; n++) numbers.push(((n + (same ? 0.5 : 0)) * Math.PI) / width);
  } else if (edge === 'periodic') {
    const phase = numberOf(member(parameters.edge, 'blochPhaseRad'));
    for (let n = -most; n <= most; n++) numbers.push((2 * Math.PI * n + phase) / width);
  }
  return numbers.filter((q) => Math.abs(q) * velocity <= energyEv * 1.05);
}
