import { execFileSync } from 'node:child_process';
import { loadCurrentKernel } from '@nightcone/kernel/node';
import { models, parseSpecification } from '@nightcone/models';
import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { BrowserlessSession } from '../../docker-free-dev/browserless-session.ts';
import { bundleForPage } from './bundle-for-page.ts';
import { chromiumPath, launchChromium, type RunningApplication, signIn, startForTest } from './fixtures.ts';

/** One worked example of each model, computed on the server, by the command line and in Chromium. */
const questions = models.map(({ id, examples }) => ({ model: id, ...examples[0] }));

describe.skipIf(!chromiumPath)('the same bits everywhere', () => {
  let application: RunningApplication;
  let browser: Browser;
  beforeAll(async () => {
    application = await startForTest();
    browser = await launchChromium();
  });
  afterAll(async () => {
    await browser?.close();
    await application?.stop();
  });

  test.each(questions)('$model: server, command line and browser give one digest', async (question) => {
    const { digest, manifest } = await loadCurrentKernel();
    const { model, parameters, numerics = {} } = question;
    const parsed = parseSpecification(manifest, { model, parameters, numerics, kernel: digest });
    if (!parsed.ok) throw new Error(JSON.stringify(parsed.problems));

    const session = new BrowserlessSession(application.url);
    await session.signIn('theorist');
    const { hash } = await session.call<{ hash: string }>('POST', '/jobs', { specification: parsed.specification });
    const onServer = await session.resultOf(hash);

    const printed = execFileSync('npx', ['nightcone', 'compute', '-', '--json'], {
      input: JSON.stringify({ model, parameters, numerics }),
      encoding: 'utf8',
      maxBuffer: 1 << 30,
    });
    const byCommandLine = JSON.parse(printed);

    const context = await browser.newContext();
    const page = await signIn(context, application.url, 'theorist');
    await page.evaluate(
      `${await bundleForPage('./browser-kernel.ts', 'reproduction')}; globalThis.reproduction = reproduction;`,
    );
    const inBrowser = await page.evaluate(`reproduction.computeInBrowser(${JSON.stringify(parsed.specification)})`);
    await context.close();

    expect(byCommandLine.jobHash).toBe(hash);
    expect(byCommandLine.resultDigest).toBe(onServer);
    expect(inBrowser).toBe(onServer);
  });
});
