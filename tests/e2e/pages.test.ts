import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { models } from '@nightcone/models';
import type { Browser, BrowserContext, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { BrowserlessSession } from '../../docker-free-dev/browserless-session.ts';
import { chromiumPath, launchChromium, type RunningApplication, signIn, startForTest } from './fixtures.ts';

const axeSource = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');

interface AxeWindow {
  axe: {
    run: (
      root: Document,
      options: object,
    ) => Promise<{ violations: { id: string; nodes: { html: string; failureSummary: string }[] }[] }>;
  };
}

/** What axe finds against WCAG 2.2 AA and its best practices, one line per place. */
async function violations(page: Page): Promise<string[]> {
  await page.evaluate(axeSource);
  return page.evaluate(async () => {
    const { violations: found } = await (window as unknown as AxeWindow).axe.run(document, {
      runOnly: ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'],
    });
    return found.flatMap(({ id, nodes }) =>
      nodes.map((node) => `${id}: ${node.html.slice(0, 200)} (${node.failureSummary.slice(0, 200)})`),
    );
  });
}

/** Loaded, drawn, nothing busy: the page says so by aria-busy and by its heading. */
async function settled(page: Page) {
  await page.getByRole('heading', { level: 1 }).first().waitFor();
  await page.waitForFunction(() => !document.querySelector('main [aria-busy="true"]'));
}

describe.skipIf(!chromiumPath)('every page', () => {
  let application: RunningApplication;
  let browser: Browser;
  const paths: string[] = [];
  beforeAll(async () => {
    application = await startForTest();
    browser = await launchChromium();
    const session = new BrowserlessSession(application.url);
    await session.signIn('theorist');
    const model = models[1];
    const example = model?.examples.find(({ sweep }) => sweep);
    const { hash } = await session.call<{ hash: string }>('POST', '/jobs', {
      specification: { model: 'landau-levels' },
    });
    await session.resultOf(hash);
    const { sweepId } = await session.call<{ sweepId: string }>('POST', '/sweeps', {
      title: 'Widths',
      specification: { model: model?.id, parameters: example?.parameters, numerics: example?.numerics ?? {} },
      axes: [{ pointers: ['/width/count'], values: [[10], [11], [12]] }],
    });
    paths.push(
      '/',
      '/question',
      ...models.map(({ id }) => `/question/${id}`),
      '/jobs',
      `/jobs/${hash}`,
      '/sweeps',
      `/sweeps/${sweepId}`,
    );
    paths.push(
      `/h/${hash}`,
      `/h/${'0'.repeat(64)}`,
      '/account',
      '/methods',
      ...models.map(({ id }) => `/methods/${id}`),
      '/nowhere',
    );
  });
  afterAll(async () => {
    await browser?.close();
    await application?.stop();
  });

  const withTheme = (theme: 'light' | 'dark', width: number): Promise<BrowserContext> =>
    browser.newContext({ colorScheme: theme, viewport: { width, height: 900 }, reducedMotion: 'reduce' });

  for (const theme of ['light', 'dark'] as const) {
    test(`has no axe violation and does not scroll sideways (${theme})`, async () => {
      const found: string[] = [];
      const context = await withTheme(theme, 1440);
      const visit = async (page: Page, path: string) => {
        await page.goto(`${application.url}${path}`);
        await settled(page);
        found.push(...(await violations(page)).map((line) => `${path} ${line}`));
      };
      const before = await context.newPage();
      await visit(before, '/sign-in');
      const page = await signIn(context, application.url, 'theorist');
      for (const path of paths) await visit(page, path);
      for (const width of [390, 320]) {
        await page.setViewportSize({ width, height: 800 });
        for (const path of paths) {
          await page.goto(`${application.url}${path}`);
          await settled(page);
          const overflow = await page.evaluate(
            () => document.documentElement.scrollWidth - document.documentElement.clientWidth,
          );
          if (overflow > 0) found.push(`${path} is ${overflow} px too wide at ${width} px`);
        }
      }
      await context.close();
      expect(found).toEqual([]);
    });
  }

  test('the admin’s pages and the waiting page have no axe violation', async () => {
    const found: string[] = [];
    const context = await withTheme('light', 1440);
    const admin = await signIn(context, application.url, 'admin');
    for (const path of ['/admin/people', '/admin/workers', '/admin/kernels']) {
      await admin.goto(`${application.url}${path}`);
      await settled(admin);
      found.push(...(await violations(admin)).map((line) => `${path} ${line}`));
    }
    await context.close();
    const other = await withTheme('dark', 1440);
    const newcomer = await signIn(other, application.url, 'newcomer');
    await settled(newcomer);
    found.push(...(await violations(newcomer)).map((line) => `waiting ${line}`));
    await other.close();
    expect(found).toEqual([]);
  });
});
