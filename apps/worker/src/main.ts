import { pino } from 'pino';
import { BadSettings, readSettings } from './read-settings.ts';
import { ComputeWorker } from './worker.ts';

function settingsOrExit() {
  try {
    return readSettings(process.argv.slice(2), process.env);
  } catch (error) {
    if (!(error instanceof BadSettings)) throw error;
    console.error(error.message);
    process.exit(2);
  }
}

const { databaseUrl, slots, logLevel } = settingsOrExit();
const log = pino({ name: 'worker', level: logLevel });
const worker = new ComputeWorker({ databaseUrl, slots, log });

// Nothing here is left unawaited on purpose: an unhandled rejection is a fault, and leases outlive the process by seconds.
process.on('unhandledRejection', (error) => {
  log.fatal({ reason: error instanceof Error ? error.stack : String(error) }, 'unhandled rejection');
  process.exit(70);
});
for (const signal of ['SIGTERM', 'SIGINT'] as const) {
  process.once(signal, () => {
    // Without its database a worker cannot give back what it has; other workers take it when its leases end.
    setTimeout(() => {
      log.warn('the database did not answer in time');
      process.exit(1);
    }, 15_000);
    void worker.stop().then(() => process.exit(0));
  });
}

await worker.start();
