import type { Command } from '../lib/command.ts';
import { exitCodes } from '../lib/exit-codes.ts';
import { wrongInput } from '../lib/failure.ts';
import { serverUrl, writeAccount } from '../server/account-file.ts';
import { ApiClient } from '../server/api-client.ts';

export const login: Command = {
  name: 'login',
  summary: 'Keep a server’s address and a personal access token.',
  usage: '<url>',
  help: `
The token is read from standard input (or NIGHTCONE_TOKEN), tried, and kept in ~/.config/nightcone/config.json, readable
by you only. Make one on the account page; \`read\` and \`submit\` are enough. The variables NIGHTCONE_URL and
NIGHTCONE_TOKEN come before the file.`,
  options: {},
  takes: [1, 1],
  async run(args, terminal) {
    const url = serverUrl(args.positionals[0] ?? '');
    const token = terminal.env.NIGHTCONE_TOKEN ?? (await terminal.stdin()).trim();
    if (!/^\S+$/.test(token)) throw wrongInput('invalid-input', 'The token is missing: write it to standard input.');
    const { account } = await new ApiClient({ url, token }).call('getSession');
    if (!account) throw wrongInput('not-signed-in', 'The server does not know this token.');
    const file = await writeAccount(terminal.env, { url, token });
    await terminal.out(`${account.login} (${account.role}) at ${url}, kept in ${file}\n`);
    return exitCodes.done;
  },
};
