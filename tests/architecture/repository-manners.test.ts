import { expect, test } from 'vitest';
import { listFiles, readFile } from '../../scripts/architecture/read-repository.ts';

test('the lock file names no registry host', () => {
  expect(readFile('package-lock.json')).not.toMatch(/"resolved": "http/);
});

test('dependencies are pinned exactly', () => {
  const loose: string[] = [];
  for (const file of listFiles('package.json', 'apps/*/package.json', 'packages/*/package.json')) {
    const { dependencies = {}, devDependencies = {} } = JSON.parse(readFile(file));
    for (const [name, version] of Object.entries({ ...dependencies, ...devDependencies })) {
      if (!name.startsWith('@nightcone/') && !/^\d+\.\d+\.\d+$/.test(String(version)))
        loose.push(`${file}: ${name} ${version}`);
    }
  }
  expect(loose).toEqual([]);
});

test('nothing is left unfinished or skipped', () => {
  const marks = new RegExp(['TO' + 'DO', 'FIX' + 'ME', 'not ' + 'implemented', '\\.on' + 'ly\\('].join('|'));
  const found = listFiles('*.ts', '*.tsx', '*.mjs').filter((file) => marks.test(readFile(file)));
  expect(found).toEqual([]);
});

test('files that documents name exist', () => {
  const missing: string[] = [];
  for (const document of ['README.md', 'DEVELOPERS.md', 'packages/kernel/README.md']) {
    if (listFiles(document).length === 0) {
      missing.push(document);
      continue;
    }
    const folder = document.includes('/') ? document.slice(0, document.lastIndexOf('/') + 1) : '';
    for (const [, target] of readFile(document).matchAll(/\]\((?!https?:|#|mailto:)([^)#\s]+)/g)) {
      const file = new URL(target as string, `file:///${folder}`).pathname.slice(1);
      if (listFiles(file).length === 0) missing.push(`${document} → ${target}`);
    }
  }
  expect(missing).toEqual([]);
});
