import { continuumRibbonGolden } from './continuum-ribbon.ts';
import type { GoldenJob } from './golden-job.ts';
import { landauLevelsGolden } from './landau-levels.ts';

export { type GoldenJob, goldenTables } from './golden-job.ts';
/** Every golden job; their result digests stand in digests.json and in the record of each release. */
export const goldenJobs: readonly GoldenJob[] = [...landauLevelsGolden, ...continuumRibbonGolden];
