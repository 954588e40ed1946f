import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { BadEnvironment, readConfig } from './config.ts';

const complete = {
  NIGHTCONE_DATABASE_URL: 'postgres://user@127.0.0.1:5432/nightcone',
  NIGHTCONE_SESSION_SECRET: 'x'.repeat(32),
  NIGHTCONE_PUBLIC_URL: 'https://nightcone.example.org/',
  NIGHTCONE_GITHUB_CLIENT_ID: 'id',
  NIGHTCONE_GITHUB_CLIENT_SECRET: 'very secret',
};
const refused = (environment: Record<string, string>) => {
  try {
    readConfig(environment);
  } catch (error) {
    if (error instanceof BadEnvironment) return error;
  }
  throw new Error('it was accepted');
};

test('a complete environment is read, with defaults', () => {
  expect(readConfig(complete)).toMatchObject({
    port: 3000,
    host: '127.0.0.1',
    publicUrl: 'https://nightcone.example.org',
  });
});
test('an empty one lists everything that is missing', () => {
  expect(refused({}).variables).toEqual(Object.keys(complete).map((name) => ({ name, message: 'is not set' })));
});
test('every bad variable is named, none is quoted', () => {
  const bad = {
    ...complete,
    NIGHTCONE_DATABASE_URL: 'mysql://secret-host',
    NIGHTCONE_SESSION_SECRET: 'too short',
    NIGHTCONE_PORT: 'eighty',
    NIGHTCONE_FIRST_ADMIN: 'somebody',
  };
  const { variables, message } = refused(bad);
  expect(variables.map(({ name }) => name).sort()).toEqual([
    'NIGHTCONE_DATABASE_URL',
    'NIGHTCONE_FIRST_ADMIN',
    'NIGHTCONE_PORT',
    'NIGHTCONE_SESSION_SECRET',
  ]);
  expect(message).not.toMatch(/secret-host|too short|eighty|somebody/);
});
test('an empty variable is one that is not set', () => {
  expect(refused({ ...complete, NIGHTCONE_GITHUB_CLIENT_ID: '' }).variables[0]?.message).toBe('is not set');
});
test('.env.example names every variable that is read', () => {
  const example = readFileSync(new URL('../../../.env.example', import.meta.url), 'utf8');
  const source = readFileSync(new URL('./config.ts', import.meta.url), 'utf8');
  for (const [name] of source.matchAll(/NIGHTCONE_[A-Z_]+(?=:)/g))
    expect(example).toMatch(new RegExp(`^#?${name}=`, 'm'));
});
