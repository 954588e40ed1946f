import { type Role, roleStyles } from '@nightcone/drawing';

/** The page's own custom properties for the pens of a drawing. */
const properties = {
  ground: '--ground',
  ink: '--ink',
  ink2: '--ink2',
  hair: '--hair',
  rule: '--rule',
  K: '--valley-k',
  kPrime: '--valley-k-prime',
  closed: '--closed',
  other: '--other',
  amber: '--amberm',
} as const;

export const roleColor = (role: Role): string => `var(${properties[roleStyles[role].color]})`;

/** The colour as it stands now, for a canvas. */
export const readColor = (element: Element, role: Role): string =>
  getComputedStyle(element).getPropertyValue(properties[roleStyles[role].color]).trim() || '#000';
export const readGround = (element: Element): string =>
  getComputedStyle(element).getPropertyValue('--ground').trim() || '#fff';
