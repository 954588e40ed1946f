/** One table of arrows for each kind of thing that has a state. A change of state is a conditional update along an arrow. */
export const accountArrows = { waiting: ['active'], active: ['deactivated'], deactivated: ['active'] } as const;
export const submissionArrows = {
  active: ['paused', 'done', 'cancelled'],
  paused: ['active', 'done', 'cancelled'],
  done: [],
  cancelled: [],
} as const;
export const jobArrows = {
  waiting: ['running'],
  running: ['waiting', 'finished', 'failed'],
  finished: ['disputed'],
  disputed: ['finished'],
  failed: [],
} as const;
export const executionArrows = {
  running: ['finished', 'failed', 'cancelled', 'broken-off'],
  finished: [],
  failed: [],
  cancelled: [],
  'broken-off': [],
} as const;
export const pointArrows = {
  held: ['waiting'],
  waiting: ['running', 'parked', 'reused', 'left-out', 'cancelled'],
  parked: ['reused', 'waiting', 'cancelled'],
  running: ['finished', 'failed', 'broken-off', 'cancelled', 'waiting'],
  'broken-off': ['waiting'],
  finished: [],
  failed: [],
  reused: [],
  'left-out': [],
  cancelled: [],
} as const;
export const workerArrows = {
  active: ['winding-down', 'silent', 'stopped'],
  'winding-down': ['stopped', 'silent'],
  silent: ['active', 'stopped'],
  stopped: [],
} as const;
export const kernelArrows = { current: ['released'], released: ['retired', 'current'], retired: ['released'] } as const;

type States<T> = Extract<keyof T, string>;
export type AccountState = States<typeof accountArrows>;
export type SubmissionState = States<typeof submissionArrows>;
export type JobState = States<typeof jobArrows>;
export type ExecutionState = States<typeof executionArrows>;
export type PointState = States<typeof pointArrows>;
export type WorkerState = States<typeof workerArrows>;
export type KernelState = States<typeof kernelArrows>;

const keys = <T extends object>(table: T) => Object.keys(table) as [States<T>, ...States<T>[]];
export const accountStates = keys(accountArrows);
export const submissionStates = keys(submissionArrows);
export const jobStates = keys(jobArrows);
export const executionStates = keys(executionArrows);
export const pointStates = keys(pointArrows);
export const workerStates = keys(workerArrows);
export const kernelStates = keys(kernelArrows);
