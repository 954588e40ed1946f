// A worker process like apps/worker/src/main.ts whose threads compute with the stand-in kernel.
import { pino } from 'pino';
import { ComputeWorker } from '../../apps/worker/src/worker.ts';

const worker = new ComputeWorker({
  databaseUrl: process.env.NIGHTCONE_DATABASE_URL ?? '',
  slots: 2,
  log: pino({ level: 'debug' }),
  threadEntry: new URL('../../apps/worker/src/threads/testing/fake-slice-thread.ts', import.meta.url),
});
process.once('SIGTERM', () => void worker.stop().then(() => process.exit(0)));
await worker.start();
