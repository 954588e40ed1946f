import { formatQuantity, type Json } from '@nightcone/models';
import { magneticLengthNm, ribbonWidthNm } from '../../../plots/closed-forms.ts';

type Body = { parameters: { [name: string]: Json }; numerics: { [name: string]: Json } };

const hbarEvS = 6.582119569509067e-16;
const boltzmannEvPerK = 8.617333262e-5;

/** What a typed number means, in one short line; null where nothing is worth saying. For reading only. */
export function derivedLine(pointer: string, value: Json | undefined, body: Body): string | null {
  if (typeof value !== 'number' || !Number.isFinite(value)) return null;
  switch (pointer.split('/').at(-1)) {
    case 'diracVelocityEvNm':
      return `v = ${formatQuantity((value * 1e-9) / hbarEvS, 'm/s', 4)}`;
    case 'count':
      return pointer.startsWith('/width') ? `W = ${formatQuantity(ribbonWidthNm(body.parameters), 'nm', 5)}` : null;
    case 'fieldT':
      return value === 0 ? null : `l_B = ${formatQuantity(magneticLengthNm(value), 'nm', 4)}`;
    case 'massEv':
      return value === 0 ? null : `gap 2|m| = ${energy(2 * Math.abs(value))}`;
    case 'biasEv':
      return value === 0 ? null : `layer 1 at ${energy(value / 2)}, layer 2 at ${energy(-value / 2)}`;
    case 'temperatureK':
      return value === 0 ? null : `k_B T = ${energy(boltzmannEvPerK * value)}`;
    case 'hwhmEv':
      return `full width ${energy(2 * value)}`;
    case 'sigmaEv':
      return `full width ${energy(2 * Math.sqrt(2 * Math.log(2)) * value)}`;
    case 'cells':
      return body.parameters.width === undefined
        ? null
        : `step ${formatQuantity(ribbonWidthNm(body.parameters) / (value + 0.5), 'nm', 3)}`;
    default:
      return null;
  }
}

const energy = (ev: number) => (Math.abs(ev) < 1 ? formatQuantity(ev * 1000, 'meV', 4) : formatQuantity(ev, 'eV', 4));
