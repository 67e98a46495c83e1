import type { Browser, Page } from 'playwright-core';
import { afterAll, afterEach, beforeAll, describe, expect, inject, it } from 'vitest';
import {
  demoSignIns,
  newVisitor,
  openBrowser,
  pictureOfFailure,
  screenshot,
  settled,
  type Visitor,
} from './harness/browser';
import { choose } from './harness/fields';
import { syntheticLog } from './harness/synthetic-log';

const VESSEL = 'Tern of the Narrows';
const COLUMNS = ['cap_port [kN]', 'cap_stbd [kN]', 'forestay [kN]', 'backstay [kN]', 'mainsheet [kN]', 'AWS'];
/** A little over the thirty hours below which no fatigue date is given. */
const HOURS = 31;

describe('a load log in, a date out', () => {
  let browser: Browser;
  let visitor: Visitor;

  beforeAll(async () => {
    browser = await openBrowser();
    visitor = await newVisitor(browser, inject('baseUrl'));
  });
  afterEach(async ({ task }) => {
    if (task.result?.state === 'fail') await pictureOfFailure(visitor.page, task.name);
  });
  afterAll(async () => {
    await browser?.close();
  });

  it('leads a surveyor from signing in to a replace-by date', async () => {
    const { page } = visitor;
    const { surveyor } = await demoSignIns(visitor);

    // Sign in by the form, as anybody would.
    await page.goto('/');
    await page.getByLabel('E-mail address').fill(surveyor.email);
    await page.getByLabel('Password').fill(surveyor.password);
    await page.getByRole('button', { name: 'Sign in', exact: true }).click();
    await page.getByRole('heading', { level: 1, name: 'Fleet' }).waitFor();
    await settled(page);
    await screenshot(page, 'path-1-fleet');

    // Register vessel, position and part.
    await page.getByRole('link', { name: 'Register a vessel' }).click();
    await page.getByLabel('Name', { exact: true }).fill(VESSEL);
    await choose(page, 'Rig', 'Cutter');
    await page.getByLabel('Build year').fill('2015');
    await choose(page, 'Time zone', 'Europe/Oslo');
    await page.getByRole('button', { name: 'Register vessel' }).click();
    await page.getByRole('heading', { level: 1, name: VESSEL, exact: true }).waitFor();
    const vesselAddress = new URL(page.url()).pathname;

    await page.getByRole('link', { name: 'Add a position' }).click();
    await choose(page, 'Place on the rig', 'Cap shroud (V1)');
    await choose(page, 'Side', 'Port');
    await page.getByRole('button', { name: 'Add position' }).click();

    await choose(page, 'Construction', '1x19 strand, stainless 316');
    await choose(page, 'Diameter', '8 mm');
    await choose(page, 'Upper terminal', 'Swaged terminal');
    await choose(page, 'Lower terminal', 'Swaged terminal');
    await page.getByLabel('Fitted on').fill('2024-04-10');
    await page.getByRole('button', { name: 'Fit this part' }).click();
    await page.waitForURL(/\/parts\/[^/]+$/);
    await page.getByRole('heading', { level: 1, name: 'Cap shroud, port', exact: true }).waitFor();
    await settled(page);
    await screenshot(page, 'path-2-part-before-any-log');
    const partAddress = new URL(page.url()).pathname;

    // Choose the file: recognised, matched, started.
    await page.goto(`${vesselAddress}/load-logs`);
    await page.getByRole('heading', { name: 'No load logs yet' }).waitFor();
    await page.getByRole('link', { name: 'Add load log' }).click();
    const file = {
      name: 'narrows-june.csv',
      mimeType: 'text/csv',
      buffer: syntheticLog({ columns: COLUMNS, rows: HOURS * 3600, startOn: '2026-06-14' }),
    };
    await page.getByLabel('Drop a load log here, or choose it').setInputFiles(file);
    await page.getByText('parted by commas').waitFor();
    await page.getByLabel('Position of column cap_port [kN]').selectOption({ label: 'Cap shroud, port' });
    await screenshot(page, 'path-3-add-load-log');

    // The connection dies in the middle of the upload: the second piece never arrives.
    let pieces = 0;
    await page.route('**/api/uploads/**', async (route) => {
      if (route.request().method() !== 'PATCH') return route.continue();
      pieces += 1;
      return pieces === 1 ? route.continue() : route.abort('connectionreset');
    });
    await page.getByRole('button', { name: 'Start upload' }).click();
    await page.getByText('The connection was lost. Trying again.').waitFor();
    await screenshot(page, 'path-4-upload-cut');

    // The window is closed and opened again: what arrived is still there, the rest goes on.
    await page.unroute('**/api/uploads/**');
    await page.reload();
    await page.getByText('Choose the same file again to send the rest of it.').waitFor();
    const before = Number(await page.getByRole('progressbar').getAttribute('aria-valuenow'));
    expect(before).toBeGreaterThan(0);
    expect(before).toBeLessThan(100);
    const sent: number[] = [];
    page.on('request', (request) => {
      if (request.method() === 'PATCH') sent.push(Number(request.headers()['upload-offset']));
    });
    await page.getByLabel('Choose narrows-june.csv to go on').setInputFiles(file);

    // Counting goes on by itself; a reload in the middle changes nothing.
    await page
      .getByRole('heading', { name: 'Findings' })
      .or(page.getByText('You may leave this page'))
      .first()
      .waitFor();
    expect(sent[0]).toBeGreaterThan(0);
    await page.reload();
    await page.getByRole('heading', { name: 'Findings' }).waitFor({ timeout: 60_000 });
    await settled(page);
    await screenshot(page, 'path-5-review');

    // Nothing is in the ledger before the click.
    const accounts = page.getByRole('table', { name: 'Allowance used before and after this log' });
    await accounts.getByRole('link', { name: 'Cap shroud, port' }).waitFor();
    await page.getByRole('button', { name: 'Post to ledger' }).click();
    await page.getByText(/^Posted by/).waitFor();

    // No date without a usage plan, and the page says what would give one.
    await page.goto(partAddress);
    await page.getByRole('heading', { name: 'What would give a fatigue date' }).waitFor();
    await settled(page);
    await screenshot(page, 'path-6-part-without-plan');
    await page.getByRole('link', { name: 'State the planned sailing' }).click();
    await page.getByLabel(/Hours under sail in a year/).fill('400');
    await page.getByRole('button', { name: 'State the plan' }).click();
    await page.getByRole('heading', { level: 1, name: VESSEL, exact: true }).waitFor();

    await page.goto(partAddress);
    await page.getByText('At the planned sailing, on the rule’s curve.').waitFor();
    await settled(page);
    await screenshot(page, 'path-7-part-with-date');
    const main = (await page.getByRole('main').innerText()).replaceAll(/[\u00a0\u202f]/g, ' ');
    expect(main).toMatch(/Allowance used\n[\d.]+ (%|times)/);
    expect(main).toContain('31 h logged');
    expect(main).toMatch(/(Fatigue allowance|Calendar rule of the material) governs\./);
    expect(main).not.toContain('What would give a fatigue date');

    // The figures belong together: an independent calculator agrees with every equation it can evaluate.
    await page.getByRole('button', { name: 'Work it out again here' }).click();
    await page.getByText('the same as above').first().waitFor();
    expect(await page.getByText('That is not the figure above').count()).toBe(0);

    // From a worst day back to the trace it came from.
    await page.getByRole('table', { name: 'Days that used most' }).getByRole('link').first().click();
    await page.getByRole('heading', { level: 1, name: 'narrows-june.csv' }).waitFor();
    const pointer = page.getByRole('slider', { name: 'Time on the trace of Cap shroud, port' });
    expect(await pointer.getAttribute('aria-valuetext')).toMatch(/1[45].Jun.2026/);
    expect(visitor.complaints.filter((line) => !line.includes('ERR_CONNECTION_RESET'))).toEqual([]);
  });

  it('notices the same file and does not post it twice', async () => {
    const { page } = visitor;
    await openAddLoadLog(page);
    await page.getByLabel('Drop a load log here, or choose it').setInputFiles({
      name: 'narrows-june-again.csv',
      mimeType: 'text/csv',
      buffer: syntheticLog({ columns: COLUMNS, rows: HOURS * 3600, startOn: '2026-06-14' }),
    });
    // Remembered from the first log.
    await page.getByText('As in an earlier log. Check it.').waitFor();
    await page.getByRole('button', { name: 'Start upload' }).click();
    await page.getByText('The same file is here already').waitFor({ timeout: 60_000 });
    await page.getByRole('button', { name: 'Post to ledger' }).waitFor({ timeout: 60_000 });
    expect(await page.getByRole('button', { name: 'Post to ledger' }).isDisabled()).toBe(true);
    await settled(page);
    await screenshot(page, 'path-8-same-file');

    await page.getByRole('button', { name: 'Set aside…' }).click();
    await page.getByLabel('Why is this log set aside?').fill('The same recording was posted before.');
    await page.getByRole('button', { name: 'Set aside', exact: true }).click();
    await page.getByText(/^Set aside by/).waitFor();
  });

  it('throws an unfinished upload away when asked to', async () => {
    const { page } = visitor;
    await openAddLoadLog(page);
    await page.getByLabel('Drop a load log here, or choose it').setInputFiles({
      name: 'narrows-july.csv',
      mimeType: 'text/csv',
      buffer: syntheticLog({ columns: COLUMNS, rows: 600, startOn: '2026-07-02' }),
    });
    await page.route('**/api/uploads/**', (route) =>
      route.request().method() === 'PATCH' ? route.abort('connectionreset') : route.continue(),
    );
    await page.getByRole('button', { name: 'Start upload' }).click();
    await page.getByText('The connection was lost. Trying again.').waitFor();
    await page.getByRole('button', { name: 'Cancel the upload…' }).click();
    await page.getByRole('button', { name: 'Throw it away' }).click();
    await page.unroute('**/api/uploads/**');
    const row = page.getByRole('row').filter({ hasText: 'narrows-july.csv' });
    await row.getByText('Upload given up').waitFor();
  });

  it('says what is wrong with a file that is no load log', async () => {
    const { page } = visitor;
    await openAddLoadLog(page);
    await page.getByLabel('Drop a load log here, or choose it').setInputFiles({
      name: 'sail-plan.csv',
      mimeType: 'text/csv',
      buffer: Buffer.from('%PDF-1.7\u0000\u0000 not a table'),
    });
    await page.getByRole('alert').getByText('not a text table').waitFor();
  });
});

async function openAddLoadLog(page: Page): Promise<void> {
  await page.goto('/fleet');
  await page.getByRole('table', { name: 'Vessels' }).getByRole('link', { name: VESSEL }).click();
  await page.getByRole('link', { name: 'Loads', exact: true }).click();
  await page.getByRole('link', { name: 'Add load log' }).click();
}
