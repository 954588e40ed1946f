import type { JobView } from '@nightcone/contracts';
import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { chromiumPath, launchChromium, type RunningApplication, signIn, startForTest } from './fixtures.ts';

describe.skipIf(!chromiumPath)('one theorist’s way through Nightcone', () => {
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

  test('from signing in to a result that reproduces by its hash', async () => {
    const context = await browser.newContext({ viewport: { width: 1440, height: 1000 } });
    const failures: string[] = [];
    context.setDefaultTimeout(20_000);
    context.on('weberror', (error) => failures.push(error.error().message));
    const page = await signIn(context, application.url, 'theorist');

    // a new question with its preview
    await page.getByRole('link', { name: 'New question' }).first().click();
    await page.getByRole('link', { name: /which subbands does a strip have/i }).click();
    await page.waitForURL(/\/question\/continuum-ribbon/);
    await page
      .getByLabel(/^subbands of/i)
      .first()
      .waitFor();
    await page
      .getByText(/preview:/i)
      .first()
      .waitFor();

    // wrong input is said in words beside the field, and nothing can be submitted
    const chains = page.getByRole('textbox', { name: /dimer lines/i });
    await chains.fill('a few');
    await page
      .getByText(/number/i)
      .first()
      .waitFor();
    expect(await page.getByRole('button', { name: 'Submit now' }).isDisabled()).toBe(true);

    // sixty jobs, their estimate, and off they go
    await chains.fill('10..69 / 60');
    await page.getByText('0 of 60', { exact: true }).waitFor();
    await page.getByRole('button', { name: 'Submit now' }).click();
    await page.waitForURL(/\/sweeps\//);

    // watched without reloading
    await page.getByText('60 of 60').first().waitFor({ timeout: 120_000 });
    await page
      .getByLabel(/gap against/i)
      .first()
      .waitFor();

    // one job, its plot, its certificate
    await page.getByText('All points in a table').click();
    await page
      .getByRole('link', { name: /\b12\b/ })
      .first()
      .click();
    await page.waitForURL(/\/jobs\/[0-9a-f]{64}/);
    const hash = page.url().slice(-64);
    await page
      .getByLabel(/^subbands of/i)
      .first()
      .waitFor();
    await page.getByRole('heading', { name: 'Certificate' }).waitFor();

    // computed again: identical
    await page.getByRole('button', { name: 'Re-run' }).click();
    await page.getByText('identical').first().waitFor({ timeout: 60_000 });
    const job = (await (await context.request.get(`${application.url}/api/v1/jobs/${hash}`)).json()) as JobView;
    expect(job.executions.map(({ bits }) => bits).sort()).toEqual(['first', 'identical']);
    expect(new Set(job.executions.map(({ resultDigest }) => resultDigest)).size).toBe(1);

    // found again by the digits that a figure would carry
    await page.keyboard.press('Control+k');
    await page.keyboard.type(hash.slice(0, 12));
    await page.keyboard.press('Enter');
    await page.waitForURL(new RegExp(`/(h|jobs)/${hash.slice(0, 12)}`));
    await page
      .getByRole('link', { name: new RegExp(hash.slice(0, 4)) })
      .or(page.getByRole('heading', { name: 'Certificate' }))
      .first()
      .waitFor();

    // and out
    await page.goto(`${application.url}/account`);
    await page
      .getByRole('button', { name: /^sign out/i })
      .first()
      .click();
    await page.waitForURL(/\/sign-in/);
    await page.goto(`${application.url}/jobs/${hash}`);
    await page.waitForURL(/\/sign-in/);
    expect(failures).toEqual([]);
    await context.close();
  });
});
