import type { Browser, BrowserContext } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, inject, it } from 'vitest';
import {
  accessibilityViolations,
  demoSignIns,
  newVisitor,
  openBrowser,
  screenshot,
  signIn,
} from './harness/browser';

const LISTS = '**/api/vessels**';

/** What the server answers while PostgreSQL is away; the tests of the server prove that it does. */
async function databaseGoesAway(context: BrowserContext): Promise<void> {
  await context.route(LISTS, (route) =>
    route.fulfill({
      status: 503,
      headers: { 'Retry-After': '5' },
      json: {
        code: 'unavailable',
        message:
          'The service cannot reach its database right now. Nothing was changed; try again in a few seconds.',
        requestId: '00000000-0000-7000-8000-000000000000',
      },
    }),
  );
}

describe('a service that is away for a moment', () => {
  let browser: Browser;
  beforeAll(async () => {
    browser = await openBrowser();
  });
  afterAll(async () => {
    await browser?.close();
  });

  it.each([
    { width: 1280, theme: 'light', away: 'database' },
    { width: 390, theme: 'dark', away: 'database' },
    { width: 390, theme: 'light', away: 'server' },
  ] as const)(
    'says so in words and comes back with one press: $away, $width px, $theme',
    async ({ width, theme, away }) => {
      const visitor = await newVisitor(browser, inject('baseUrl'), { width, theme });
      const { page, context } = visitor;
      const { rigger } = await demoSignIns(visitor);
      await signIn(visitor, rigger.email, rigger.password);
      if (away === 'database') await databaseGoesAway(context);
      else await context.route(LISTS, (route) => route.abort('connectionrefused'));
      await page.goto('/fleet');
      const problem = page.getByRole('main').getByRole('alert').first();
      await problem.waitFor();
      expect(await problem.innerText()).toMatch(
        away === 'database' ? /cannot reach its database/ : /could not be reached/,
      );
      await screenshot(page, `away-${away}-${width}-${theme}`);
      expect(await accessibilityViolations(page)).toEqual([]);

      // Several questions of the page failed; one press asks all of them again.
      await context.unroute(LISTS);
      await page.getByRole('main').getByRole('button', { name: 'Try again' }).first().click();
      await page.getByRole('link', { name: 'Ternesund', exact: true }).waitFor();
      await page.getByRole('heading', { name: 'Work due' }).waitFor();
      await problem.waitFor({ state: 'detached' });
      expect(await page.getByRole('main').getByRole('alert').count()).toBe(0);
      await context.close();
    },
  );
});
