import { mkdtemp, readFile, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { run } from '../testing/run.ts';
import { smallQuestions } from '../testing/small-questions.ts';

/** The parts of a result file that are tampered with. */
interface ResultFile {
  resultDigest: string;
  specification: { parameters: { levels?: number } };
  arrays: { name: string; values: number[] }[];
}

const folder = await mkdtemp(join(tmpdir(), 'nightcone-'));
const first = smallQuestions[0]?.specification;

describe.each(smallQuestions)('$name', ({ name, specification }) => {
  const file = (ending: string) => join(folder, `${name}.${ending}`);

  test('prints the stable shape; one, two and four threads give the same bits', async () => {
    const one = await run(['compute', '-', '--json', '--threads', '1'], { stdin: specification });
    expect(one).toMatchObject({ exitCode: 0, err: '' });
    const printed = JSON.parse(one.out);
    expect(Object.keys(printed)).toEqual([
      'jobHash',
      'resultDigest',
      'kernel',
      'specification',
      'arrays',
      'certificate',
      'notes',
    ]);
    expect(printed.jobHash).toBe((await run(['hash', '-'], { stdin: specification })).out.trim());
    for (const array of printed.arrays) {
      expect(array.values.length, array.name).toBe(array.shape.reduce((a: number, b: number) => a * b, 1));
      if (array.ragged) expect(array.offsets.at(-1), array.name).toBe(array.shape[0]);
    }
    for (const threads of ['2', '4'])
      expect((await run(['compute', '-', '--json', '--threads', threads], { stdin: specification })).out).toBe(one.out);
  });

  test('written as .npz and .json, verified again', async () => {
    for (const ending of ['npz', 'json']) {
      const written = await run(['compute', '-', '--out', file(ending)], { stdin: specification });
      expect(written.exitCode).toBe(0);
      const verified = await run(['verify', file(ending)]);
      expect(verified).toMatchObject({ exitCode: 0, err: '' });
      expect(verified.out).toContain('reproduced: every bit is the same');
    }
  });
});

test('what the model’s validity refuses ends with 2 unless it is insisted on; what the kernel refuses ends with 3 and its reason, on one thread and on several', async () => {
  const specification = {
    model: 'landau-levels',
    parameters: { system: { kind: 'bilayer', v3Ratio: 0.1 }, fieldT: { kind: 'values', values: [1, 2] } },
    numerics: { method: { kind: 'closed-form' } },
  };
  const beyond = await run(['compute', '-'], { stdin: specification });
  expect(beyond.exitCode).toBe(2);
  expect(beyond.problem()).toMatchObject({ code: 'validity-refused', errors: [{ field: '/numerics/method' }] });
  for (const threads of ['1', '2']) {
    const argv = ['compute', '-', '--beyond-validity', '--threads', threads];
    const refused = await run(argv, { stdin: specification });
    expect(refused).toMatchObject({ exitCode: 3, out: '' });
    expect(refused.err).toMatch(/^method-unavailable: /);
  }
});

describe('verify ends with 4', () => {
  const result = join(folder, 'result.json');
  const tampered = join(folder, 'tampered.json');
  const verifyWith = async (change: (file: ResultFile) => void) => {
    await run(['compute', '-', '--out', result], { stdin: first });
    const file = JSON.parse(await readFile(result, 'utf8'));
    change(file);
    await writeFile(tampered, JSON.stringify(file));
    const ran = await run(['verify', tampered, '--json']);
    return { exitCode: ran.exitCode, ...JSON.parse(ran.out) };
  };

  test('when one number was changed, and says where', async () => {
    const answer = await verifyWith(({ arrays }) => {
      const values = arrays.find(({ name }) => name === 'energies')?.values ?? [];
      values[3] = (values[3] ?? 0) + 1e-12;
    });
    expect(answer).toMatchObject({ exitCode: 4, reproduced: false, claims: { jobHash: true, arrays: false } });
    const changed = answer.comparison.arrays.find(({ name }: { name: string }) => name === 'energies');
    expect(changed).toMatchObject({ verdict: 'different', count: 1 });
  });

  test('when the specification was changed', async () => {
    const answer = await verifyWith(({ specification }) => {
      specification.parameters.levels = 4;
    });
    expect(answer).toMatchObject({ exitCode: 4, reproduced: false, claims: { jobHash: false, arrays: true } });
  });

  test('when the digest was changed', async () => {
    const answer = await verifyWith((file) => {
      file.resultDigest = '0'.repeat(64);
    });
    expect(answer).toMatchObject({ exitCode: 4, claims: { jobHash: true, arrays: false } });
    expect(answer.comparison.identical).toBe(true);
  });
});
