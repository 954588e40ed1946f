// The application on this machine: stand-in for the sign-in provider, API, worker. Used by `npm start` and the walk in the browser.
import net from 'node:net';
import path from 'node:path';
import { setTimeout as wait } from 'node:timers/promises';
import { root } from './paths.mjs';

/** The preferred port when nobody holds it, else any free one. */
export function pickPort(preferred = 0) {
  const attempt = (port) =>
    new Promise((resolve, reject) => {
      const server = net.createServer().once('error', reject);
      server.listen(port, '127.0.0.1', () => {
        const { port: taken } = server.address();
        server.close(() => resolve(taken));
      });
    });
  return attempt(preferred).catch(() => attempt(0));
}

async function untilReady(url, failed) {
  for (;;) {
    const answer = await Promise.race([fetch(`${url}/api/v1/health`).catch(() => undefined), failed]);
    if (answer?.ok) return;
    await wait(100);
  }
}

/**
 * Starts everything over a migrated database; resolves when the API answers.
 * @param {{ processes: import('./processes.mjs').Processes, databaseUrl: string, port: number, sessionSecret: string, slots?: number, onExit?: (error: Error) => void }} options
 */
export async function startApplication({ processes, databaseUrl, port, sessionSecret, slots = 2, onExit }) {
  const url = `http://127.0.0.1:${port}`;
  const client = { NIGHTCONE_GITHUB_CLIENT_ID: 'nightcone-local', NIGHTCONE_GITHUB_CLIENT_SECRET: 'nightcone-local' };
  const [providerUrl] = await processes.start('sign-in-provider', 'docker-free-dev/sign-in-provider/main.ts', {
    env: client,
    ready: /http:\/\/127\.0\.0\.1:\d+/,
    onExit,
  });
  const environment = {
    ...client,
    NIGHTCONE_DATABASE_URL: databaseUrl,
    NIGHTCONE_SESSION_SECRET: sessionSecret,
    NIGHTCONE_PUBLIC_URL: url,
    NIGHTCONE_PORT: String(port),
    NIGHTCONE_WEB_DIST: path.join(root, 'apps/web/dist'),
    NIGHTCONE_GITHUB_AUTHORIZATION_URL: `${providerUrl}/login/oauth/authorize`,
    NIGHTCONE_GITHUB_TOKEN_URL: `${providerUrl}/login/oauth/access_token`,
    NIGHTCONE_GITHUB_USER_URL: `${providerUrl}/user`,
  };
  let fail;
  const failed = new Promise((_, reject) => {
    fail = reject;
  });
  failed.catch(() => {});
  const ended = (error) => {
    fail(error);
    onExit?.(error);
  };
  await processes.start('api', 'apps/api/src/main.ts', { env: environment, onExit: ended });
  await startWorker({ processes, databaseUrl, slots, onExit: ended });
  await untilReady(url, failed);
  return { url, providerUrl };
}

export function startWorker({ processes, databaseUrl, slots = 2, name = 'worker', onExit }) {
  return processes.start(name, 'apps/worker/src/main.ts', {
    args: ['--slots', String(slots)],
    env: { NIGHTCONE_DATABASE_URL: databaseUrl },
    onExit,
  });
}
