/**
 * npm run kernel:release               copies the built kernel to packages/kernel/releases and records its golden digests
 * npm run kernel:release -- --goldens  rewrites the committed digests of the golden jobs from the built kernel instead
 *
 * A release is <version>-<first 12 hex digits>.wasm and a .json of the same name: its digest, and for every golden job
 * the complete specification, its tables and the result digest. Both are committed and never change afterwards.
 */
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { type GoldenJob, goldenJobs, goldenTables } from '@nightcone/kernel/golden';
import { type LoadedKernel, loadCurrentKernel, openKernel } from '@nightcone/kernel/node';
import { parseSpecification } from '@nightcone/models';
import { resultDigest } from '@nightcone/provenance';

const kernelFolder = new URL('../packages/kernel/', import.meta.url);
const digestsFile = new URL('src/golden/digests.json', kernelFolder);
const releasesFolder = new URL('releases/', kernelFolder);
const readJson = <T>(file: URL) => JSON.parse(readFileSync(file, 'utf8')) as T;
const writeJson = (file: URL, value: unknown) => writeFileSync(file, `${JSON.stringify(value, null, 2)}\n`);

async function computeGolden(kernel: LoadedKernel, job: GoldenJob) {
  const { name, model, parameters, numerics, tables } = job;
  const parsed = parseSpecification(kernel.manifest, { model, parameters, numerics, kernel: kernel.digest });
  if (!parsed.ok) throw new Error(`${name}: ${parsed.problems[0]?.message}`);
  const { specification } = parsed;
  const instance = openKernel(kernel.module);
  instance.open(specification, goldenTables(job));
  const payloads = Array.from({ length: instance.sliceCount() }, (_, slice) => instance.computeSlice(slice));
  return {
    name,
    model,
    parameters: specification.parameters,
    numerics: specification.numerics,
    ...(tables ? { tables } : {}),
    resultDigest: await resultDigest(instance.assemble(payloads)),
  };
}

const kernel = await loadCurrentKernel();
const { digest: locked } = readJson<{ digest: string }>(new URL('kernel.lock.json', kernelFolder));
if (locked !== kernel.digest) {
  throw new Error(`build/kernel.wasm is ${kernel.digest}, kernel.lock.json says ${locked}: build the kernel first.`);
}
const golden = [];
for (const job of goldenJobs) golden.push(await computeGolden(kernel, job));
const digests = Object.fromEntries(golden.map(({ name, resultDigest }) => [name, resultDigest]));

if (process.argv.includes('--goldens')) {
  writeJson(digestsFile, digests);
  console.log(`${golden.length} golden digests of kernel ${kernel.digest.slice(0, 12)} written`);
} else {
  const committed = readJson<Record<string, string>>(digestsFile);
  const changed = golden.filter(({ name, resultDigest }) => committed[name] !== resultDigest).map(({ name }) => name);
  if (changed.length > 0) throw new Error(`Golden digests differ from the committed ones: ${changed.join(', ')}.`);
  const { version } = kernel.manifest;
  const stem = `${version}-${kernel.digest.slice(0, 12)}`;
  const file = new URL(`${stem}.wasm`, releasesFolder);
  if (existsSync(file)) throw new Error(`${stem} is released already.`);
  mkdirSync(releasesFolder, { recursive: true });
  writeFileSync(file, kernel.bytes);
  writeJson(new URL(`${stem}.json`, releasesFolder), { version, digest: kernel.digest, golden });
  console.log(`released ${stem}`);
}
