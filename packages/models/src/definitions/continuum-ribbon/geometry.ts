import type { SpecificationBody } from '../../expression.ts';
import type { Json } from '../../fields.ts';

export type Choice = { kind: string; [member: string]: Json };

/** Width of the strip in nm; + − × ÷ √ only. */
export function ribbonWidthNm(parameters: SpecificationBody['parameters']): number {
  const width = parameters.width as Choice;
  const bond = Number(parameters.bondLengthNm);
  if (width.kind === 'dimer-lines') return ((Number(width.count) + 1) * Math.sqrt(3) * bond) / 2;
  if (width.kind === 'zigzag-chains')
    return (1.5 * Number(width.count) + (width.rule === 'matching' ? 0.75 : 1)) * bond;
  return Number(width.widthNm);
}

/** A bound of |profile| across the strip; 0 for a table, whose rows are not in the specification. */
export function profileBound(profile: Choice, widthNm: number): number {
  const size = (value: number) => (value < 0 ? -value : value);
  switch (profile.kind) {
    case 'polynomial': {
      let bound = 0;
      let power = 1;
      for (const coefficient of profile.coefficients as number[]) {
        bound += size(coefficient) * power;
        power *= widthNm / 2;
      }
      return bound;
    }
    case 'steps':
      return Math.max(...(profile.values as number[]).map(size));
    case 'sine':
      return size(Number(profile.amplitude));
    default:
      return 0;
  }
}

/** Integral of a polynomial or step profile over the strip; undefined for the other kinds. */
export function profileIntegral(profile: Choice, widthNm: number): number | undefined {
  const half = widthNm / 2;
  if (profile.kind === 'none') return 0;
  if (profile.kind === 'polynomial') {
    let sum = 0;
    let power = half;
    for (const [n, coefficient] of (profile.coefficients as number[]).entries()) {
      if (n % 2 === 0) sum += (2 * coefficient * power) / (n + 1);
      power *= half;
    }
    return sum;
  }
  if (profile.kind !== 'steps') return undefined;
  const edges = profile.edges as number[];
  let sum = 0;
  for (const [i, value] of (profile.values as number[]).entries()) {
    const from = Math.max(-half, edges[i - 1] ?? -half);
    const to = Math.min(half, edges[i] ?? half);
    if (to > from) sum += value * (to - from);
  }
  return sum;
}
