import { once } from 'node:events';
import { text } from 'node:stream/consumers';
import { runCommand } from './run-command.ts';

// A reader that leaves early (`| head`) is no error of ours.
process.stdout.on('error', (error: NodeJS.ErrnoException) => {
  if (error.code === 'EPIPE') process.exit();
  throw error;
});

// Not process.exit: what is still on its way to standard output must arrive.
process.exitCode = await runCommand(process.argv.slice(2), {
  out: async (data) => {
    if (!process.stdout.write(data)) await once(process.stdout, 'drain');
  },
  err: (message) => void process.stderr.write(message),
  stdin: () => text(process.stdin),
  env: process.env,
  showsProgress: process.stderr.isTTY === true,
});
