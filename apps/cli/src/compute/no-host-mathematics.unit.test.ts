import { openKernel } from '@nightcone/kernel';
import { loadCurrentKernel } from '@nightcone/kernel/node';
import { models, parseSpecification } from '@nightcone/models';
import { jobHash, questionDigest, resultDigest } from '@nightcone/provenance';
import { afterEach, expect, test } from 'vitest';
import { smallQuestions } from '../testing/small-questions.ts';

/** Every function of the host's Math, and the operator that shares its imprecision, must stay untouched. */
const original = Object.getOwnPropertyDescriptors(Math);
afterEach(() => {
  Object.defineProperties(Math, original);
});

function forbidMathematics() {
  for (const [name, { value }] of Object.entries(original))
    if (typeof value === 'function')
      Object.defineProperty(Math, name, {
        configurable: true,
        writable: true,
        value: () => {
          throw new Error(`the host computed Math.${name}`);
        },
      });
}

test('the guard works', () => {
  forbidMathematics();
  expect(() => Math.sqrt(2)).toThrow(/Math.sqrt/);
});

test.each(smallQuestions)(
  '$name: parsed, encoded, computed, assembled and digested without the host’s Math',
  async (question) => {
    const { digest, manifest, module } = await loadCurrentKernel();
    const work = async () => {
      const parsed = parseSpecification(manifest, { ...question.specification, kernel: digest });
      if (!parsed.ok) throw new Error(JSON.stringify(parsed.problems));
      const kernel = openKernel(module);
      kernel.open(parsed.specification);
      const payloads = Array.from({ length: kernel.sliceCount() }, (_, slice) => kernel.computeSlice(slice));
      const result = kernel.assemble(payloads);
      const { specification } = parsed;
      return [await jobHash(specification), await questionDigest(manifest, specification), await resultDigest(result)];
    };
    const undisturbed = await work();
    forbidMathematics();
    expect(await work()).toEqual(undisturbed);
  },
);

test('every model has a small question', () => {
  const asked = new Set(smallQuestions.map(({ specification }) => specification.model));
  expect(models.map(({ id }) => id).filter((id) => !asked.has(id))).toEqual([]);
});
