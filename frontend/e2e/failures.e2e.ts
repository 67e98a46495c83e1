import type { Browser, Page } from 'playwright-core';
import { afterAll, afterEach, beforeAll, describe, expect, inject, it } from 'vitest';
import {
  demoSignIns,
  newVisitor,
  openBrowser,
  pictureOfFailure,
  screenshot,
  settled,
  signIn,
  type DemoSignIn,
  type Visitor,
} from './harness/browser';
import { syntheticLog } from './harness/synthetic-log';

const ABSENT = '0190a0a0-0000-7000-8000-000000000002';
const refusal = (code: string, message: string) =>
  JSON.stringify({ code, message, requestId: '0190a0a0-0000-7000-8000-00000000000a' });

describe('when something is wrong', () => {
  let browser: Browser;
  let visitor: Visitor;
  let surveyor: DemoSignIn;
  let vesselAddress: string;

  beforeAll(async () => {
    browser = await openBrowser();
    visitor = await newVisitor(browser, inject('baseUrl'));
    ({ surveyor } = await demoSignIns(visitor));
  });
  afterEach(async ({ task }) => {
    if (task.result?.state === 'fail') await pictureOfFailure(visitor.page, task.name);
  });
  afterAll(async () => {
    await browser?.close();
  });

  it('tells a throttled sign-in when to come back, and a lost service from a wrong password', async () => {
    const { page } = visitor;
    await page.goto('/');
    await page.getByLabel('E-mail address').fill(surveyor.email);
    await page.getByLabel('Password').fill('not the password');
    const press = () => page.getByRole('button', { name: 'Sign in', exact: true }).click();
    // Eleven true guesses would slow down the other journeys, which come from the same address.
    const body = refusal('too-many-attempts', 'Too many attempts. Try again in 10 minutes.');
    await page.route('**/api/auth/sign-in', (route) =>
      route.fulfill({
        status: 429,
        headers: { 'Retry-After': '600' },
        contentType: 'application/json',
        body,
      }),
    );
    await press();
    await page.getByRole('alert').getByText('Try again in 10 minutes').waitFor();
    await screenshot(page, 'wrong-1-throttled');
    await page.unroute('**/api/auth/sign-in');

    await page.route('**/api/auth/sign-in', (route) => route.abort('connectionrefused'));
    await press();
    await page.getByRole('alert').getByText('The server could not be reached').waitFor();
    await page.unroute('**/api/auth/sign-in');

    await press();
    await page.getByRole('alert').getByText('The e-mail address or the password is not right').waitFor();
    expect(await page.getByLabel('E-mail address').inputValue()).toBe(surveyor.email);
  });

  it('says that the database is away, and goes on when it is back', async () => {
    const { page } = visitor;
    await signIn(visitor, surveyor.email, surveyor.password);
    const body = refusal('unavailable', 'The service cannot reach its database right now.');
    await page.route(/\/api\/vessels(\?|$)/, (route) =>
      route.fulfill({ status: 503, headers: { 'Retry-After': '5' }, contentType: 'application/json', body }),
    );
    await page.goto('/fleet');
    await page.getByText('cannot reach its database').first().waitFor();
    await screenshot(page, 'wrong-2-database-away');
    await page.unroute(/\/api\/vessels(\?|$)/);
    await page.getByRole('button', { name: 'Try again' }).last().click();
    const first = page.getByRole('table', { name: 'Vessels' }).getByRole('link').first();
    await first.waitFor();
    vesselAddress = (await first.getAttribute('href')) ?? '';
    expect(vesselAddress).toMatch(/^\/vessels\//);
  });

  it('answers absent vessels, logs and pages alike, without a hint', async () => {
    const { page } = visitor;
    for (const address of [`/vessels/${ABSENT}`, `/load-logs/${ABSENT}`, '/no/such/page']) {
      await page.goto(address);
      await page.getByText(/not shared with you/).waitFor();
      await page.getByText('Check the address').waitFor();
    }
    await screenshot(page, 'wrong-3-not-found');
  });

  it('shows what somebody else stored in the meantime, and keeps it until one decides', async () => {
    const { page, context } = visitor;
    await page.goto(`${vesselAddress}/edit`);
    await page.getByLabel('Home port').fill('Here');
    const other = await context.newPage();
    await other.goto(`${vesselAddress}/edit`);
    await other.getByLabel('Home port').fill('There');
    await other.getByRole('button', { name: 'Save vessel' }).click();
    await other.waitForURL((url) => !url.pathname.endsWith('/edit'));
    await other.close();
    await page.getByRole('button', { name: 'Save vessel' }).click();
    await page.getByRole('alert').getByText('changed by somebody else in the meantime').waitFor();
    expect(await page.getByLabel('Home port').inputValue()).toBe('Here');
    await screenshot(page, 'wrong-4-conflict');
    await page.getByRole('button', { name: 'Show what is stored now' }).click();
    await page.waitForFunction(() =>
      [...document.querySelectorAll('input')].some(({ value }) => value === 'There'),
    );
  });

  it('refuses ten thousand columns at once, and shortens an endless cell', async () => {
    const { page } = visitor;
    const wide = [
      `time${',c'.repeat(9999)}`,
      ...Array.from({ length: 3 }, (_, row) => `2026-06-01T00:00:0${row}Z${',1.5'.repeat(9999)}`),
    ];
    await chooseFile(page, 'wide.csv', Buffer.from(wide.join('\n')));
    await page.getByRole('alert').getByText('at most 1000 can be matched').waitFor();
    await screenshot(page, 'wrong-5-columns');
    const endless = `time,load\n2026-06-01T00:00:00Z,1\n2026-06-01T00:00:01Z,${'9'.repeat(10 * 1024 ** 2)}\n`;
    await chooseFile(page, 'endless.csv', Buffer.from(endless));
    await page.getByRole('table', { name: 'First rows of the file' }).waitFor();
    const cells = await page
      .getByRole('table', { name: 'First rows of the file' })
      .locator('td')
      .allInnerTexts();
    expect(Math.max(...cells.map((cell) => cell.length))).toBeLessThan(80);
  });

  it('says that the storage is full, and keeps the form', async () => {
    const { page } = visitor;
    await chooseFile(
      page,
      'full.csv',
      syntheticLog({ columns: ['load [kN]'], rows: 60, startOn: '2026-05-01' }),
    );
    await page.getByLabel('Position of column load [kN]').selectOption({ index: 1 });
    const body = refusal(
      'storage-full',
      'The storage of the service has room for 0.0 GiB. Ask the administrator.',
    );
    await page.route('**/load-logs', (route) =>
      route.request().method() === 'POST'
        ? route.fulfill({ status: 507, contentType: 'application/json', body })
        : route.continue(),
    );
    await page.getByRole('button', { name: 'Start upload' }).click();
    await page.getByRole('alert').getByText('The storage of the service has room for').waitFor();
    await screenshot(page, 'wrong-6-storage-full');
    await page.unroute('**/load-logs');
  });

  it('says line, cell and mend of a log that cannot be counted', async () => {
    const { page } = visitor;
    const rows = syntheticLog({ columns: ['load [kN]'], rows: 3000, startOn: '2026-05-02' });
    await chooseFile(
      page,
      'broken.csv',
      Buffer.concat([rows, Buffer.from('2026-05-02T08:00:00Z,1\u00005\n')]),
    );
    await page.getByLabel('Position of column load [kN]').selectOption({ index: 1 });
    await page.getByRole('button', { name: 'Start upload' }).click();
    await page.getByText('Line 3002, cell 2: there is a NUL byte').waitFor({ timeout: 60_000 });
    await page.getByText('Export the log as .csv or .csv.gz').waitFor();
    expect(
      await page
        .getByRole('button', { name: 'Post to ledger' })
        .isEnabled()
        .catch(() => false),
    ).toBe(false);
    await settled(page);
    await screenshot(page, 'wrong-7-failed-log');
  });

  it('leads somebody whose session ended back to where they were', async () => {
    const { page, context } = visitor;
    await page.goto(`${vesselAddress}/edit`);
    await page.getByLabel('Home port').fill('Lost?');
    await context.clearCookies();
    await page.getByRole('button', { name: 'Save vessel' }).click();
    await page.getByLabel('E-mail address').fill(surveyor.email);
    await page.getByLabel('Password').fill(surveyor.password);
    await screenshot(page, 'wrong-8-signed-out');
    await page.getByRole('button', { name: 'Sign in', exact: true }).click();
    await page.waitForURL(`**${vesselAddress}/edit`);
    // Nothing but the refusals and lost connections arranged above.
    const expected = /status of (401|404|409|429|503|507)|ERR_CONNECTION_REFUSED/;
    expect(visitor.complaints.filter((line) => !expected.test(line))).toEqual([]);
  });

  async function chooseFile(page: Page, name: string, buffer: Buffer): Promise<void> {
    await page.goto(`${vesselAddress}/load-logs`);
    await page.getByRole('link', { name: 'Add load log' }).first().click();
    await page
      .getByLabel('Drop a load log here, or choose it')
      .setInputFiles({ name, mimeType: 'text/csv', buffer });
  }
});
