import { execFileSync } from 'node:child_process';
import fs from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import type { WorkspacePackage } from './check-imports.ts';

const root = fileURLToPath(new URL('../..', import.meta.url));

/** Files of the repository, tracked or new, that git does not ignore; paths with forward slashes. */
export function listFiles(...patterns: string[]): string[] {
  const listed = execFileSync('git', ['ls-files', '-co', '--exclude-standard', '-z', '--', ...patterns], {
    cwd: root,
    encoding: 'utf8',
  });
  return listed.split('\0').filter((file) => file !== '' && fs.existsSync(path.join(root, file)));
}

export const readFile = (file: string): string => fs.readFileSync(path.join(root, file), 'utf8');

/** TypeScript sources but for AssemblyScript's, which its own compiler checks. */
export function readSources(): Map<string, string> {
  const files = listFiles('*.ts', '*.tsx').filter(
    (file) => !file.endsWith('.d.ts') && !file.startsWith('packages/kernel/assembly/'),
  );
  return new Map(files.map((file) => [file, readFile(file)]));
}

export function readPackages(): WorkspacePackage[] {
  return listFiles('packages/*/package.json', 'apps/*/package.json').map((file) => {
    const { name, exports = {} } = JSON.parse(readFile(file));
    return { name, folder: path.posix.dirname(file), exports };
  });
}
