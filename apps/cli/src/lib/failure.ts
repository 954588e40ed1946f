import { commonProblems, type Problem, type ProblemCode } from '@nightcone/contracts';
import { exitCodes } from './exit-codes.ts';

/** Ends a command with an exit code; what is said goes to standard error. */
export class CommandFailure extends Error {
  override name = 'CommandFailure';
  constructor(
    readonly exitCode: number,
    message: string,
    readonly problem?: Problem,
  ) {
    super(message);
  }
}

/** Wrong input: exit code 2 and a problem document. */
export function wrongInput(code: ProblemCode, detail: string, errors?: Problem['errors']): CommandFailure {
  const problem: Problem = {
    type: 'about:blank',
    title: 'The input cannot be used',
    status: commonProblems[code],
    code,
    detail,
    ...(errors ? { errors } : {}),
  };
  return new CommandFailure(exitCodes.wrongInput, detail, problem);
}
