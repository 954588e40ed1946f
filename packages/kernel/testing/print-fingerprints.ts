import { goldenJobs } from '../src/golden/index.ts';
import { loadCurrentKernel, openKernel } from '../src/node.ts';
import { goldenFingerprint } from './fingerprint.ts';

/** Run as a child under different WebAssembly compilers of V8: prints { name: fingerprint } of all golden jobs. */
const kernel = openKernel((await loadCurrentKernel()).module);
console.log(JSON.stringify(Object.fromEntries(goldenJobs.map((job) => [job.name, goldenFingerprint(kernel, job)]))));
