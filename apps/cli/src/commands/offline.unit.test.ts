import { createHash } from 'node:crypto';
import { mkdtemp, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { loadCurrentKernel } from '@nightcone/kernel/node';
import { describe, expect, test } from 'vitest';
import { run } from '../testing/run.ts';
import { commands } from './index.ts';

const ribbon = { model: 'continuum-ribbon', parameters: { fieldT: 10 } };

describe('help', () => {
  test('without arguments, and for every command', async () => {
    expect(await run([])).toMatchObject({ exitCode: 2 });
    const all = await run(['--help']);
    expect(all.exitCode).toBe(0);
    for (const { name } of commands) {
      expect(all.out).toContain(`  ${name}`);
      const one = await run([name, '--help']);
      expect(one.exitCode).toBe(0);
      expect(one.out).toContain(`Usage: nightcone ${name}`);
    }
  });

  test('every option of a command is in its help', async () => {
    for (const { name, help, usage, options } of commands)
      for (const option of Object.keys(options)) expect(`${usage}${help}`, name).toContain(`--${option}`);
  });
});

describe('wrong input ends with 2 and a problem document', () => {
  test.each([
    ['an unknown command', ['verfy'], '', 'invalid-input', /nearest is verify/],
    ['an unknown option', ['hash', '-', '--jsn'], ribbon, 'invalid-input', /--jsn/],
    ['too many files', ['hash', 'a', 'b'], '', 'invalid-input', /Usage: nightcone hash/],
    ['no such file', ['hash', '/none/such.json'], '', 'invalid-input', /no such file/],
    ['a folder', ['hash', '/'], '', 'invalid-input', /folder/],
    ['no JSON', ['hash', '-'], '{', 'invalid-input', /Standard input is no JSON/],
    ['a list', ['hash', '-'], [], 'invalid-specification', /JSON object/],
    [
      'threads',
      ['compute', '-', '--threads', '0'],
      ribbon,
      'invalid-input',
      /--threads is “0”; it must be a whole number/,
    ],
    ['another ending', ['compute', '-', '--out', 'a.txt'], ribbon, 'invalid-input', /\.npz, \.json or \.csv/],
    ['an unknown kernel', ['hash', '-'], { ...ribbon, kernel: 'f'.repeat(64) }, 'unknown-kernel', /is not here/],
    ['a kernel that is no digest', ['hash', '-'], { ...ribbon, kernel: 7 }, 'unknown-kernel', /Kernel 7 is not here/],
    [
      'a module that is none',
      ['hash', '-', '--kernel', import.meta.filename],
      ribbon,
      'unknown-kernel',
      /is no kernel/,
    ],
    [
      'a table left out',
      ['compute', '-'],
      { model: 'continuum-ribbon', parameters: { massEv: { kind: 'table', table: 'a'.repeat(64) } } },
      'invalid-specification',
      /--table/,
    ],
    ['a result that is none', ['verify', import.meta.filename], '', 'invalid-input', /is no result file/],
  ])('%s', async (_name, argv, stdin, code, detail) => {
    const ran = await run(argv, { stdin });
    expect(ran.exitCode).toBe(2);
    expect(ran.out).toBe('');
    expect(ran.problem().code).toBe(code);
    expect(ran.problem().detail).toMatch(detail);
  });

  test('a bad specification names field, value and limit', async () => {
    const ran = await run(['compute', '-'], { stdin: { ...ribbon, parameters: { fieldT: '12 T', fieldS: 1 } } });
    expect(ran.exitCode).toBe(2);
    expect(ran.problem()).toMatchObject({
      status: 422,
      code: 'invalid-specification',
      errors: [
        { field: '/parameters/fieldT', value: '12 T', limit: '-1000 to 1000 T' },
        { field: '/parameters/fieldS', message: expect.stringContaining('nearest known name is fieldT') },
      ],
    });
  });
});

describe('hash', () => {
  test('is of the canonical text; defaults and order change nothing', async () => {
    const { digest } = await loadCurrentKernel();
    const canonical = (await run(['hash', '-', '--canonical'], { stdin: ribbon })).out;
    const short = (await run(['hash', '-'], { stdin: ribbon })).out.trim();
    expect(short).toBe(createHash('sha256').update(canonical).digest('hex'));
    expect(JSON.parse(canonical)).toMatchObject({ schema: 'nightcone.job/1', kernel: digest, tables: [] });
    const spelledOut = Object.fromEntries(Object.entries(JSON.parse(canonical)).reverse());
    expect((await run(['hash', '-'], { stdin: spelledOut })).out.trim()).toBe(short);
  });

  test('takes the module of --kernel and refuses another than the named one', async () => {
    const { digest, bytes } = await loadCurrentKernel();
    const file = join(await mkdtemp(join(tmpdir(), 'nightcone-')), 'kernel.wasm');
    await writeFile(file, bytes);
    expect((await run(['hash', '-', '--kernel', file], { stdin: { ...ribbon, kernel: digest } })).exitCode).toBe(0);
    const other = await run(['hash', '-', '--kernel', file], { stdin: { ...ribbon, kernel: 'e'.repeat(64) } });
    expect(other).toMatchObject({ exitCode: 2 });
    expect(other.problem().detail).toMatch(/names kernel e{64}/);
  });
});

test('kernels lists the current one', async () => {
  const { digest, manifest } = await loadCurrentKernel();
  const { rows } = JSON.parse((await run(['kernels', '--json'])).out);
  expect(rows[0]).toMatchObject({ digest, state: 'current', version: manifest.version });
  expect((await run(['kernels'])).out).toContain(digest);
});

test('estimate tells slices, time, memory and bytes', async () => {
  const answer = JSON.parse((await run(['estimate', '-', '--json'], { stdin: ribbon })).out);
  expect(answer.slices).toBeGreaterThan(0);
  expect(answer.cpuMs).toBeGreaterThan(0);
  expect(answer.memoryBytes).toBeGreaterThan(0);
  expect(answer.resultBytes).toBeGreaterThan(0);
  expect(answer.jobHash).toBe((await run(['hash', '-'], { stdin: ribbon })).out.trim());
  expect((await run(['estimate', '-'], { stdin: ribbon })).out).toMatch(/slices +\d/);
});
