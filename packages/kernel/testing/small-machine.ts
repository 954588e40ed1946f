import { loadCurrentKernel, openKernel } from '../src/node.ts';
import { runJob } from './run-job.ts';

/** Run by kernel-status.test.ts under a V8 that grants few pages: prints what a job that needs more ends with. */
const kernel = openKernel((await loadCurrentKernel()).module);
const long = { kind: 'range', start: 0, stop: 1, count: 2001 };
try {
  runJob(kernel, { model: 'landau-levels', parameters: { fieldT: long, energyEv: long } });
  console.log('finished');
} catch (error) {
  console.log((error as Error).name);
}
