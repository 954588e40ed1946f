import { type Expression, evaluateExpression } from '@nightcone/models';
import { beforeAll, describe, expect, it } from 'vitest';
import { goldenJobs } from '../src/golden/index.ts';
import { modelOf } from '../src/manifest.ts';
import { type KernelInstance, loadCurrentKernel, openKernel } from '../src/node.ts';
import { openGolden } from '../testing/fingerprint.ts';
import { complete } from '../testing/run-job.ts';

/** The manifest's trees, from which 10⁵ points of a sweep are estimated, against the kernel itself. */
let module: WebAssembly.Module;
beforeAll(async () => {
  ({ module } = await loadCurrentKernel());
});
const memoryOf = (kernel: KernelInstance) =>
  (Reflect.get(kernel, 'kernel') as { memory: WebAssembly.Memory }).memory.buffer.byteLength;

describe.each(goldenJobs)('$name', (job) => {
  it('has the slices, cost, bytes and memory that its formulas say', () => {
    const kernel = openKernel(module);
    const { model } = modelOf(kernel.manifest, job.model);
    const { parameters, numerics } = job;
    const body = complete(kernel.manifest, { model: job.model, parameters, numerics });
    const evaluate = (expression: Expression) => evaluateExpression(expression, model, body);
    openGolden(kernel, job);

    const count = kernel.sliceCount();
    expect(evaluate(model.sliceCount)).toBe(count);
    let cost = 0;
    for (let i = 0; i < count; i++) cost += kernel.sliceCost(i);
    expect(Math.abs(evaluate(model.cost) / cost - 1)).toBeLessThan(0.05);
    expect(Math.abs(evaluate(model.assembleCost) / kernel.assembleCost() - 1)).toBeLessThan(0.25);

    const payloads = Array.from({ length: count }, (_, i) => kernel.computeSlice(i));
    expect(memoryOf(kernel)).toBeLessThanOrEqual(evaluate(model.sliceBytes) + 65_536);
    const result = kernel.assemble(payloads);
    expect(memoryOf(kernel)).toBeLessThanOrEqual(
      Math.max(evaluate(model.sliceBytes), evaluate(model.assembleBytes)) + 65_536,
    );
    const bytes = result.arrays.reduce((sum, array) => sum + array.bytes.length, 0);
    expect(bytes).toBeLessThanOrEqual(evaluate(model.resultBytes));
    expect(evaluate(model.resultBytes)).toBeLessThan(2 * bytes + 4096);
  });
});
