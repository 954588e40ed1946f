import { endpoints } from '@nightcone/contracts';
import { expect, test } from 'vitest';
import { openApiDocument } from './describe-endpoints.ts';
import { docsPage } from './docs-page.ts';

const document = openApiDocument('1.0.0') as {
  openapi: string;
  paths: Record<string, Record<string, { operationId: string; parameters: { in: string; name: string }[] }>>;
  components: { schemas: Record<string, object> };
};
const operations = Object.values(document.paths).flatMap((path) => Object.values(path));

test('describes every endpoint once', () => {
  expect(operations.map(({ operationId }) => operationId).sort()).toEqual(Object.keys(endpoints).sort());
});
test('names every parameter of a path', () => {
  for (const [path, methods] of Object.entries(document.paths)) {
    const named = [...path.matchAll(/\{(\w+)\}/g)].map(([, name]) => name).sort();
    for (const { parameters } of Object.values(methods))
      expect(
        parameters
          .filter((parameter) => parameter.in === 'path')
          .map(({ name }) => name)
          .sort(),
      ).toEqual(named);
  }
});
test('every reference leads to a component', () => {
  const references = [...JSON.stringify(document).matchAll(/"\$ref":"#\/([^"]+)"/g)].map(([, path]) => path as string);
  expect(references.length).toBeGreaterThan(10);
  for (const path of new Set(references)) {
    const found = path
      .split('/')
      .reduce<unknown>((at, key) => (at as Record<string, unknown> | undefined)?.[key], document);
    expect(found, path).toBeDefined();
  }
});
test('holds the specification of each model, with defaults', () => {
  expect(JSON.stringify(document.components.schemas['specification-landau-levels'])).toMatch(/"fieldT"/);
});
test('the page to read has an entry for each and nothing from elsewhere', () => {
  const page = docsPage(document);
  for (const id of Object.keys(endpoints)) expect(page).toContain(`<article id="${id}">`);
  expect(page).not.toMatch(/<script|src=|https?:/);
});
