// The main job of a first start: the worked example of sixty armchair ribbons, submitted through the public API.
// Prints where to look and how to sign in once the first results are there.
import { setTimeout as wait } from 'node:timers/promises';
import type { Sweep, SweepPoint } from '@nightcone/contracts';
import { models } from '@nightcone/models';
import { BrowserlessSession } from './browserless-session.ts';
import { demoAccounts } from './sign-in-provider/demo-accounts.ts';

const url = process.argv[2];
if (!url) throw new Error('usage: demo-sweep.ts <address>');
const example = models
  .flatMap((model) => model.examples.map((entry) => ({ model: model.id, ...entry })))
  .find((entry) => entry.id === 'armchair-subbands-by-width');
if (!example) throw new Error('The worked example armchair-subbands-by-width is missing.');

const session = new BrowserlessSession(url);
await session.signIn('theorist');
const { sweepId } = await session.call<{ sweepId: string }>(
  'POST',
  '/sweeps',
  {
    title: example.title,
    specification: { model: example.model, parameters: example.parameters, numerics: example.numerics ?? {} },
    axes: example.sweep,
    when: 'now',
  },
  // the same key at every start: the sweep is submitted once, however often the application starts
  { 'idempotency-key': 'demo-sweep' },
);

async function firstFinished(): Promise<SweepPoint> {
  for (;;) {
    const { rows } = await session.call<{ rows: SweepPoint[] }>('GET', `/sweeps/${sweepId}/points`);
    const point = rows.find((row) => row.resultDigest !== null);
    if (point) return point;
    const failed = rows.find((row) => row.failure);
    if (failed) throw new Error(`The demo sweep failed: ${failed.failure?.text}`);
    await wait(250);
  }
}
const point = await firstFinished();
const sweep = await session.call<Sweep>('GET', `/sweeps/${sweepId}`);

console.log(`
Nightcone is running:  ${url}

Sign in with a demo account (the stand-in's page asks which; there is no password):
${demoAccounts.map((account) => `  ${account.login.padEnd(12)} ${account.unknown ? 'waits until the admin admits it' : account.role}`).join('\n')}

The demo sweep “${sweep.title}” is at ${sweep.submission.progress.done} of ${sweep.points} jobs:
  ${url}/sweeps/${sweepId}

A hash to look up:     ${point.jobHash}
  ${url}/h/${point.jobHash}

Ctrl-C ends everything; what was computed stays.`);
