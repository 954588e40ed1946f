import {
  evaluateExpression,
  type Json,
  type ModelDefinition,
  models,
  partOf,
  type Specification,
  setPointer,
  validityOf,
  type WorkedExample,
} from '@nightcone/models';
import { beforeAll, describe, expect, it } from 'vitest';
import { type KernelInstance, loadCurrentKernel, openKernel } from '../src/node.ts';
import { complete } from '../testing/run-job.ts';

/** Every worked example is one click away from being submitted: it must be valid, and its certificate must hold. */
let kernel: KernelInstance;
beforeAll(async () => {
  kernel = openKernel((await loadCurrentKernel()).module);
});

/** The example at one end of its sweep. */
function pointOf(model: ModelDefinition, example: WorkedExample, end: 0 | -1): Specification {
  let body: Json = { parameters: example.parameters, numerics: example.numerics ?? {} };
  for (const { pointers, values } of example.sweep ?? []) {
    const point = values.at(end) ?? [];
    pointers.forEach((pointer, i) => {
      body = setPointer(body, `/${partOf(model, pointer)}${pointer}`, point[i] as Json);
    });
  }
  const { parameters, numerics } = body as { parameters: { [name: string]: Json }; numerics: { [name: string]: Json } };
  return complete(kernel.manifest, { model: model.id, parameters, numerics });
}
const all = models.flatMap((model) => model.examples.map((example) => ({ id: example.id, model, example })));

describe.each(all)('$id', ({ model, example }) => {
  it.each([0, -1] as const)('is valid at sweep end %d, refused by no note', (end) => {
    const notes = validityOf(model, pointOf(model, example, end));
    expect(notes.filter(({ severity }) => severity === 'refuse')).toEqual([]);
  });

  it('finishes with every check of its certificate holding', () => {
    const specification = pointOf(model, example, -1);
    // what takes more than about two seconds is computed by the benchmarks
    if (evaluateExpression(model.cost, model, specification) > 2e9) return;
    kernel.open(specification);
    const payloads = Array.from({ length: kernel.sliceCount() }, (_, i) => kernel.computeSlice(i));
    const { certificate } = kernel.assemble(payloads);
    expect(certificate.checks.filter(({ holds }) => !holds)).toEqual([]);
  }, 60_000);
});
