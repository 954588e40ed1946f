// The deploy step: tables, functions, ticket queues, and the kernel of this checkout as the current one. Repeatable.

import { createDb, createPool, migrate, storeKernel } from '@nightcone/db';
import { loadCurrentKernel } from '@nightcone/kernel/node';

const url = process.env.NIGHTCONE_DATABASE_URL;
if (!url) {
  console.error('Set NIGHTCONE_DATABASE_URL to the database to bring up to date.');
  process.exit(2);
}
await migrate(url);
const pool = createPool(url, { max: 1 });
try {
  const { digest, bytes, manifest } = await loadCurrentKernel();
  await storeKernel(createDb(pool), { digest, bytes, manifest, version: manifest.version, current: true });
  console.log(`The database is up to date; the current kernel is ${manifest.version}, ${digest.slice(0, 12)}.`);
} finally {
  await pool.end();
}
