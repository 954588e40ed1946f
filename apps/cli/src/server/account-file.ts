import { mkdir, readFile, writeFile } from 'node:fs/promises';
import { homedir } from 'node:os';
import { dirname, join } from 'node:path';
import type { Terminal } from '../lib/command.ts';
import { wrongInput } from '../lib/failure.ts';

/** Where the server is and the personal access token for it. */
export interface ServerAccount {
  url: string;
  token: string;
}

type Environment = Terminal['env'];

/** `$XDG_CONFIG_HOME/nightcone/config.json`, by default below `~/.config`. */
export function accountFile(env: Environment): string {
  return join(env.XDG_CONFIG_HOME || join(env.HOME || homedir(), '.config'), 'nightcone', 'config.json');
}

/** From NIGHTCONE_URL and NIGHTCONE_TOKEN, else from the file that `login` wrote. */
export async function readAccount(env: Environment): Promise<ServerAccount> {
  const stored = await readFile(accountFile(env), 'utf8')
    .then((text) => JSON.parse(text) as Partial<ServerAccount>)
    .catch(() => ({}) as Partial<ServerAccount>);
  const url = env.NIGHTCONE_URL ?? stored.url;
  // a token goes to the server it was made for, never to another one that the environment names
  const token = env.NIGHTCONE_TOKEN ?? (url === stored.url ? stored.token : undefined);
  if (!url || !token)
    throw wrongInput('not-signed-in', 'Set NIGHTCONE_URL and NIGHTCONE_TOKEN, or run nightcone login.');
  return { url: serverUrl(url), token };
}

/** Address of the server without a trailing slash; wrong input where it is none. */
export function serverUrl(text: string): string {
  const url = URL.canParse(text) ? new URL(text) : undefined;
  if (url === undefined || !/^https?:$/.test(url.protocol))
    throw wrongInput('invalid-input', `“${text}” is no address of a server: https://… is expected.`);
  const loopback = ['127.0.0.1', 'localhost', '[::1]'].includes(url.hostname);
  if (url.protocol === 'http:' && !loopback)
    throw wrongInput('invalid-input', `“${text}” would send the token unencrypted; use https.`);
  return `${url.origin}${url.pathname.replace(/\/+$/, '')}`;
}

/** Keeps the account, readable by its owner only. */
export async function writeAccount(env: Environment, account: ServerAccount): Promise<string> {
  const file = accountFile(env);
  await mkdir(dirname(file), { recursive: true, mode: 0o700 });
  await writeFile(file, `${JSON.stringify(account, undefined, 2)}\n`, { mode: 0o600 });
  return file;
}
