import type { Problem, ProblemCode } from '@nightcone/contracts';

export type FieldError = NonNullable<Problem['errors']>[number];

/** A refusal that the caller may read. Everything else that is thrown becomes 'internal' without its text. */
export class Refusal extends Error {
  override name = 'Refusal';
  constructor(
    readonly code: ProblemCode,
    detail: string,
    readonly more: Pick<Problem, 'errors' | 'figures'> = {},
  ) {
    super(detail);
  }
}

/** Unknown and not permitted look the same. */
export const notFound = (what: string) =>
  new Refusal('not-found', `There is no such ${what}, or it is not yours to see.`);
