import type { Problem } from '@nightcone/contracts';

/** A refused or failed request: RFC 9457 details with a stable `code`. */
export class ApiProblem extends Error {
  override readonly name = 'ApiProblem';
  readonly problem: Problem;

  constructor(problem: Problem) {
    super(problem.detail || problem.title);
    this.problem = problem;
  }

  get code(): string {
    return this.problem.code;
  }
  get status(): number {
    return this.problem.status;
  }
}

/** Nothing answered. */
export const offlineProblem: Problem = {
  type: 'about:blank',
  title: 'Not connected',
  status: 0,
  code: 'offline',
  detail: 'The server does not answer. What you typed is kept here.',
};

/** Reads the problem document of an answer; a proxy's page becomes one too. */
export async function problemOf(response: Response): Promise<Problem> {
  if (response.headers.get('content-type')?.includes('json')) {
    const body: unknown = await response.json().catch(() => null);
    if (typeof body === 'object' && body !== null && 'code' in body) return body as Problem;
  }
  return {
    type: 'about:blank',
    title: response.statusText || 'Not answered',
    status: response.status,
    code: response.status >= 500 ? 'unavailable' : 'not-found',
    detail: `The server answered ${response.status} without saying why.`,
  };
}
