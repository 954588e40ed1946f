import path from 'node:path';
import { expect, test } from 'vitest';
import { listFiles } from '../../scripts/architecture/read-repository.ts';

/** One word per feature in every layer. */
const features = [
  'accounts',
  'models',
  'jobs',
  'sweeps',
  'figures',
  'manuscripts',
  'reviews',
  'quotas',
  'tables',
  'kernels',
  'workers',
  'queue',
  'audit',
  'lookup',
  'mail',
  'events',
];
/** Not features: shared by all of a layer. */
const shared: Record<string, string[]> = {
  'packages/contracts/src/features': ['common'],
  'packages/db/src/schema': ['columns', 'idempotency'],
  'packages/db/src/queries': ['idempotency'],
};

const folders = [
  'apps/api/src/features',
  'apps/web/src/features',
  'apps/worker/src/features',
  'packages/contracts/src/features',
  'packages/db/src/schema',
  'packages/db/src/queries',
];

test.each(folders)('%s uses the names of the features', (folder) => {
  const names = new Set(
    listFiles(`${folder}/*`).map(
      (file) =>
        path.posix
          .relative(folder, file)
          .split('/')[0]
          ?.replace(/\.(test\.)?ts$/, '') ?? '',
    ),
  );
  expect([...names].filter((name) => !features.includes(name) && !shared[folder]?.includes(name))).toEqual([]);
});
