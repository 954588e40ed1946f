import { spawn } from 'node:child_process';
import { text } from 'node:stream/consumers';
import { setTimeout as wait } from 'node:timers/promises';
import { fileURLToPath } from 'node:url';
import { expect, test } from 'vitest';

const bin = fileURLToPath(new URL('../bin/nightcone.mjs', import.meta.url));

/** Runs the real command with `input` on standard input; its output is not read until `slow` milliseconds have passed. */
async function start(argv: string[], input: object, slow = 0) {
  const child = spawn(process.execPath, [bin, ...argv], { stdio: 'pipe', env: { ...process.env, NO_COLOR: '1' } });
  child.stdin.end(JSON.stringify(input));
  const ended = new Promise<number | null>((resolve) => child.once('close', resolve));
  const err = text(child.stderr);
  await wait(slow);
  const out = await text(child.stdout);
  return { out, err: await err, exitCode: await ended };
}

test('the exit code and the problem document reach the shell', async () => {
  const ran = await start(['hash', '-'], { model: 'nothing' });
  expect(ran).toMatchObject({ exitCode: 2, out: '' });
  expect(JSON.parse(ran.err).code).toBe('invalid-specification');
});

test('a result larger than a pipe arrives whole, however slowly it is read', async () => {
  const parameters = { fieldT: { kind: 'range', start: 0, stop: 10, count: 21 }, levels: 3 };
  const ran = await start(['compute', '-', '--json'], { model: 'landau-levels', parameters }, 1500);
  expect(ran).toMatchObject({ exitCode: 0, err: '' });
  expect(ran.out.length).toBeGreaterThan(500_000);
  expect(JSON.parse(ran.out).notes).toBeInstanceOf(Array);
}, 20_000);
