import type { Json } from './fields.ts';

/**
 * A small arithmetic tree over a complete specification, stored in the kernel's manifest: slice count, cost and memory
 * of 10⁵ points are evaluated from it without opening the kernel.
 *
 * `read` is a JSON Pointer into `{ parameters, numerics }`. An axis reads as its number of points, a list as its
 * length, an enum or choice as its index needs the manifest and is asked with `is` instead; a member of a kind that is
 * not chosen reads as 0.
 */
export type Expression =
  | number
  | { read: string }
  /** 1 when the choice (its kind) or enum at `is` equals `kind`, else 0. An axis given as a bare number is 'number'. */
  | { is: string; kind: string }
  | { op: '+' | '-' | '*' | '/' | 'sqrt' | 'min' | 'max' | 'floor'; args: Expression[] };

export interface SpecificationBody {
  parameters: { [name: string]: Json };
  numerics: { [name: string]: Json };
}
