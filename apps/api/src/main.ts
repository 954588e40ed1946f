import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import { pino } from 'pino';
import { createApp } from './app.ts';
import { BadEnvironment, type Config, readConfig } from './config.ts';
import { startServices } from './start-services.ts';

function configOrExit(): Config {
  try {
    return readConfig(process.env);
  } catch (error) {
    if (!(error instanceof BadEnvironment)) throw error;
    console.error(`Nightcone's API does not start: ${error.message}`);
    process.exit(2);
  }
}

const config = configOrExit();
const logger = pino({ level: config.logLevel, base: undefined });
const running = startServices(config, logger);
const server = createServer(createApp(running.services, running.pool));

server.once('error', (error) => {
  logger.fatal({ reason: error.message }, 'cannot listen');
  process.exit(1);
});
server.listen(config.port, config.host, () => {
  const { port } = server.address() as AddressInfo;
  logger.info({ port }, 'listening');
});

let stopping = false;
async function stop(): Promise<void> {
  if (stopping) return;
  stopping = true;
  const closed = new Promise((resolve) => server.close(resolve));
  // Requests get a moment to end; event streams never end by themselves.
  setTimeout(() => server.closeAllConnections(), 1000).unref();
  server.closeIdleConnections();
  await closed;
  await running.stop();
}
for (const signal of ['SIGINT', 'SIGTERM'] as const) process.on(signal, () => void stop());
