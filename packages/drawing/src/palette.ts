import { oklchToHex } from './oklch.ts';
import type { Role } from './plot.ts';

/** Colours of a drawing that leaves the page: the page itself takes them from its style sheet's custom properties. */
export interface Palette {
  name: 'paper' | 'night';
  ground: string;
  ink: string;
  ink2: string;
  hair: string;
  rule: string;
  K: string;
  kPrime: string;
  closed: string;
  other: string;
  amber: string;
}

export const paper: Palette = {
  name: 'paper',
  ground: oklchToHex(0.982, 0.008, 90),
  ink: oklchToHex(0.24, 0.02, 270),
  ink2: oklchToHex(0.43, 0.02, 270),
  hair: oklchToHex(0.87, 0.012, 90),
  rule: oklchToHex(0.62, 0.015, 270),
  K: oklchToHex(0.6, 0.19, 37),
  kPrime: oklchToHex(0.41, 0.075, 210),
  closed: oklchToHex(0.64, 0.012, 270),
  other: oklchToHex(0.65, 0.012, 270),
  amber: oklchToHex(0.63, 0.145, 66),
};

export const night: Palette = {
  name: 'night',
  ground: oklchToHex(0.19, 0.025, 275),
  ink: oklchToHex(0.92, 0.012, 90),
  ink2: oklchToHex(0.79, 0.012, 90),
  hair: oklchToHex(0.34, 0.03, 275),
  rule: oklchToHex(0.55, 0.03, 275),
  K: oklchToHex(0.7, 0.17, 40),
  kPrime: oklchToHex(0.86, 0.085, 195),
  closed: oklchToHex(0.52, 0.02, 275),
  other: oklchToHex(0.52, 0.025, 275),
  amber: oklchToHex(0.8, 0.135, 75),
};

export interface RoleStyle {
  color: keyof Omit<Palette, 'name'>;
  width: number;
  dash: string | null;
}

/** Meaning to pen: K solid, K′ dashed, closed forms thin and grey, markers dotted. */
export const roleStyles: Record<Role, RoleStyle> = {
  ink: { color: 'ink', width: 1.7, dash: null },
  K: { color: 'K', width: 1.8, dash: null },
  'K-prime': { color: 'kPrime', width: 1.8, dash: '6 4' },
  mixed: { color: 'ink', width: 1.5, dash: null },
  closed: { color: 'closed', width: 1, dash: null },
  marker: { color: 'rule', width: 1, dash: '1 4' },
  other: { color: 'other', width: 1.2, dash: null },
  failed: { color: 'ink', width: 1, dash: '1 3' },
  running: { color: 'amber', width: 1.7, dash: null },
};
