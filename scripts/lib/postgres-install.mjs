import { spawnSync } from 'node:child_process';
import fs from 'node:fs';
import path from 'node:path';

const isRoot = process.getuid?.() === 0;

/** Folder with initdb and postgres (psql alone is only a client), or undefined. NIGHTCONE_PG_BIN wins. */
export function findPostgres() {
  const folders = [];
  if (process.env.NIGHTCONE_PG_BIN) folders.push(process.env.NIGHTCONE_PG_BIN);
  try {
    const versions = fs.readdirSync('/usr/lib/postgresql').sort((a, b) => Number(b) - Number(a));
    folders.push(...versions.map((version) => `/usr/lib/postgresql/${version}/bin`));
  } catch {
    // not a Debian server installation: PATH is searched next
  }
  folders.push(...(process.env.PATH ?? '').split(':'));
  return folders.find((f) => f && fs.existsSync(path.join(f, 'initdb')) && fs.existsSync(path.join(f, 'postgres')));
}

/** apt-get as root, quietly, the output kept for a failure. Returns whether it worked. */
export function aptInstall(packages) {
  if (!isRoot || spawnSync('apt-get', ['--version']).status !== 0) return false;
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
  const run = (args) => spawnSync('apt-get', args, { env, encoding: 'utf8' });
  const install = () => run(['install', '-y', '--no-install-recommends', '-o', 'DPkg::Lock::Timeout=300', ...packages]);
  // on a new machine the package lists are missing or old: fetch them, then install
  if (install().status === 0) return true;
  run(['update', '-o', 'DPkg::Lock::Timeout=300']);
  const result = install();
  if (result.status !== 0) process.stderr.write(`${result.stdout}${result.stderr}`);
  return result.status === 0;
}

/** PostgreSQL's folder; installs it from Debian when this is root, else says the exact command and ends with 3. */
export function requirePostgres() {
  const found = findPostgres();
  if (found) return found;
  if (isRoot) {
    console.error('PostgreSQL is not installed: installing it from Debian …');
    // without this Debian makes (and starts) a cluster of its own on port 5432
    fs.mkdirSync('/etc/postgresql-common', { recursive: true });
    const conf = '/etc/postgresql-common/createcluster.conf';
    if (!fs.existsSync(conf)) fs.writeFileSync(conf, 'create_main_cluster = false\n');
    aptInstall(['postgresql']);
    const installed = findPostgres();
    if (installed) return installed;
  }
  console.error(
    'The PostgreSQL server was not found, and installing it needs root. Run:\n\n' +
      '    sudo apt-get update && sudo apt-get install -y postgresql\n\n' +
      'or set NIGHTCONE_PG_BIN to the folder that holds initdb and postgres, then start again.',
  );
  process.exit(3);
}
