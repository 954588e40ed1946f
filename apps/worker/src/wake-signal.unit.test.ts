import { expect, it } from 'vitest';
import { WakeSignal } from './wake-signal.ts';

const long = 3_600_000;

it('wakes all sleepers', async () => {
  const signal = new WakeSignal();
  const sleepers = [signal.sleep(signal.wakes, long), signal.sleep(signal.wakes, long)];
  signal.wake();
  await Promise.all(sleepers);
});

it('lets nobody sleep who has not seen the last wake, however many have', async () => {
  const signal = new WakeSignal();
  const seen = signal.wakes;
  signal.wake();
  await signal.sleep(seen, long);
  await signal.sleep(seen, long);
});

it('ends a sleep without a wake', async () => {
  const signal = new WakeSignal();
  await signal.sleep(signal.wakes, 1);
  expect(signal.wakes).toBe(0);
});
