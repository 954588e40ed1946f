import { readdirSync, readFileSync } from 'node:fs';
import { openKernel } from '@nightcone/kernel';
import { type GoldenJob, goldenJobs, goldenTables } from '@nightcone/kernel/golden';
import { type LoadedKernel, loadCurrentKernel, loadKernelBytes } from '@nightcone/kernel/node';
import { parseSpecification } from '@nightcone/models';
import { describe, expect, it } from 'vitest';
import { resultDigest } from './result-digest.ts';

/** Result digests of the golden jobs, for the kernel of this tree and for every kernel ever released. */
const kernelFolder = new URL('../../kernel/', import.meta.url);
const readJson = <T>(path: string) => JSON.parse(readFileSync(new URL(path, kernelFolder), 'utf8')) as T;

interface Release {
  version: string;
  digest: string;
  golden: (GoldenJob & { resultDigest: string })[];
}

async function goldenDigest(kernel: LoadedKernel, job: GoldenJob): Promise<string> {
  const { model, parameters, numerics } = job;
  const parsed = parseSpecification(kernel.manifest, { model, parameters, numerics, kernel: kernel.digest });
  if (!parsed.ok) throw new Error(JSON.stringify(parsed.problems[0]));
  const instance = openKernel(kernel.module);
  instance.open(parsed.specification, goldenTables(job));
  const payloads = Array.from({ length: instance.sliceCount() }, (_, slice) => instance.computeSlice(slice));
  return resultDigest(instance.assemble(payloads));
}

describe('the current kernel', () => {
  const committed = readJson<Record<string, string>>('src/golden/digests.json');

  it('has a committed digest for every golden job', () => {
    expect(Object.keys(committed)).toEqual(goldenJobs.map(({ name }) => name));
  });

  it.each(goldenJobs)('$name', async (job) => {
    expect(await goldenDigest(await loadCurrentKernel(), job)).toBe(committed[job.name]);
  });
});

const releases = readdirSync(kernelFolder).includes('releases')
  ? readdirSync(new URL('releases/', kernelFolder)).filter((name) => name.endsWith('.json'))
  : [];
describe.each(releases)('release %s', (record) => {
  const release = readJson<Release>(`releases/${record}`);
  const bytes = readFileSync(new URL(`releases/${record.replace('.json', '.wasm')}`, kernelFolder));

  it('holds the bytes it is named after', async () => {
    const kernel = await loadKernelBytes(bytes);
    expect(kernel.digest).toBe(release.digest);
    expect(record).toBe(`${kernel.manifest.version}-${release.digest.slice(0, 12)}.json`);
  });

  it.each(release.golden)('$name', async (job) => {
    expect(await goldenDigest(await loadKernelBytes(bytes), job)).toBe(job.resultDigest);
  });
});
