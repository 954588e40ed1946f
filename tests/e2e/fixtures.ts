import { randomBytes } from 'node:crypto';
import { type Browser, type BrowserContext, chromium } from 'playwright-core';
import { pickPort, startApplication } from '../../scripts/lib/application.mjs';
import { Processes } from '../../scripts/lib/processes.mjs';
import { findChromium, typescript } from '../../scripts/lib/setup.mjs';
import { createDatabase, dropDatabase, startPostgres } from '../../scripts/postgres.mjs';

export interface RunningApplication {
  url: string;
  databaseUrl: string;
  processes: Processes;
  stop: () => Promise<void>;
}

/** A whole Nightcone over a database of its own: stand-in for sign-in, API, worker with two slots, the built web application. */
export async function startForTest(): Promise<RunningApplication> {
  const server = process.env.NIGHTCONE_TEST_SERVER_URL ?? (await startPostgres('test'));
  const name = `nightcone_e2e_${process.pid}_${randomBytes(4).toString('hex')}`;
  const databaseUrl = createDatabase(server, name);
  const env = { ...process.env, NIGHTCONE_DATABASE_URL: databaseUrl };
  await typescript('The migration', 'scripts/migrate.ts', [], { env });
  await typescript('The demo seed', 'docker-free-dev/seed.ts', [], { env });
  const processes = new Processes(`e2e-${process.pid}`);
  const { url } = await startApplication({
    processes,
    databaseUrl,
    port: await pickPort(),
    sessionSecret: randomBytes(32).toString('hex'),
  });
  return {
    url,
    databaseUrl,
    processes,
    stop: async () => {
      await processes.stop();
      dropDatabase(server, name);
    },
  };
}

export const chromiumPath = findChromium();

/** Flags for a machine whose network is closed: no look-ups of its own, no updates. */
export function launchChromium(): Promise<Browser> {
  return chromium.launch({
    executablePath: chromiumPath,
    args: [
      '--no-sandbox',
      '--disable-gpu',
      '--disable-quic',
      '--no-first-run',
      '--disable-background-networking',
      '--disable-component-update',
      '--disable-sync',
    ],
  });
}

/** Signs in through the stand-in's page as a person would. */
export async function signIn(context: BrowserContext, url: string, account: string) {
  const page = await context.newPage();
  await page.goto(`${url}/sign-in`);
  await page.getByRole('link', { name: /sign in/i }).click();
  await page.getByRole('link', { name: account, exact: true }).click();
  await page.waitForURL(`${url}/`);
  return page;
}
