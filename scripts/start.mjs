// npm start: everything from a clean checkout to a running Nightcone with a demo sweep at work.
import { randomBytes } from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';
import { pickPort, startApplication } from './lib/application.mjs';
import { localDir } from './lib/paths.mjs';
import { Processes } from './lib/processes.mjs';
import {
  ensureKernel,
  ensurePackages,
  ensureWeb,
  requireNode,
  requireWritable,
  say,
  typescript,
} from './lib/setup.mjs';
import { createDatabase, startPostgres, stopPostgres } from './postgres.mjs';

/** Kept between starts, so that addresses and sessions stay the same. */
const stateFile = path.join(localDir, 'start.json');

function readState() {
  try {
    return JSON.parse(fs.readFileSync(stateFile, 'utf8'));
  } catch {
    return { port: 4780, sessionSecret: randomBytes(32).toString('hex') };
  }
}

const processes = new Processes();
let ending;
function end(code) {
  ending ??= (async () => {
    await processes.stop();
    stopPostgres('main');
    process.exit(code);
  })();
  return ending;
}
for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) {
  process.on(signal, () => {
    if (!ending) say('\nEnding: running slices are given back, results stay.');
    end(0);
  });
}

/** A start of this checkout that still runs; a process id alone may have been given to somebody else since. */
function runningStart({ pid }) {
  try {
    return pid !== undefined && fs.readFileSync(`/proc/${pid}/cmdline`, 'utf8').includes('start.mjs');
  } catch {
    return false;
  }
}

async function start() {
  requireNode();
  requireWritable();
  const last = readState();
  if (runningStart(last)) {
    say(`Nightcone of this checkout runs already: http://127.0.0.1:${last.port} (process ${last.pid}).`);
    return;
  }
  await ensurePackages();
  const [server] = await Promise.all([startPostgres('main'), ensureKernel().then(ensureWeb)]);
  const databaseUrl = createDatabase(server, 'nightcone');
  await typescript('The migration', 'scripts/migrate.ts', [], {
    env: { ...process.env, NIGHTCONE_DATABASE_URL: databaseUrl },
  });
  await typescript('The demo seed', 'docker-free-dev/seed.ts', [], {
    env: { ...process.env, NIGHTCONE_DATABASE_URL: databaseUrl },
  });
  const state = readState();
  state.port = await pickPort(state.port);
  fs.writeFileSync(stateFile, JSON.stringify({ ...state, pid: process.pid }), { mode: 0o600 });
  const { url } = await startApplication({
    processes,
    databaseUrl,
    ...state,
    onExit: (error) => {
      console.error(error.message);
      end(1);
    },
  });
  say(await typescript('The demo sweep', 'docker-free-dev/demo-sweep.ts', [url]));
}

await start().catch((error) => {
  if (ending) return;
  console.error(error.message);
  return end(1);
});
