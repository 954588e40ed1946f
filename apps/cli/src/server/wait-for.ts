import { setTimeout as wait } from 'node:timers/promises';
import type { JobView, Submission } from '@nightcone/contracts';
import type { Terminal } from '../lib/command.ts';
import type { ApiClient } from './api-client.ts';

/** Asks again at growing intervals until `ended` says so; `tell` gets every change. */
export async function askUntil<T>(
  ask: () => Promise<T>,
  ended: (answer: T) => boolean,
  tell: (answer: T) => void,
  longestMs = 3000,
): Promise<T> {
  for (let pause = 250; ; pause = Math.min(pause * 1.5, longestMs)) {
    const answer = await ask();
    tell(answer);
    if (ended(answer)) return answer;
    await wait(pause);
  }
}

/** Tells a line on standard error when it is another one than before. */
export function changedLines(terminal: Terminal): (line: string) => void {
  let last = '';
  return (line) => {
    if (line !== last) terminal.err(`${line}\n`);
    last = line;
  };
}

/** Waits until a job has a result or has failed. */
export function waitForJob(client: ApiClient, hash: string, terminal: Terminal): Promise<JobView> {
  const tell = changedLines(terminal);
  return askUntil(
    () => client.call('getJob', { params: { hash } }),
    (job) => job.resultDigest !== null || job.state === 'failed',
    (job) => tell(`job ${hash.slice(0, 12)} is ${job.state}`),
  );
}

/** Waits until a submission is done or cancelled. */
export function waitForSubmission(client: ApiClient, id: string, terminal: Terminal): Promise<Submission> {
  const tell = changedLines(terminal);
  return askUntil(
    () => client.call('getSubmission', { params: { id } }),
    ({ state }) => state === 'done' || state === 'cancelled',
    ({ state, progress, unit, why }) =>
      tell(`${state}: ${progress.done} of ${progress.total} ${unit}${why === '' ? '' : `, ${why}`}`),
  );
}
