import type { Browser } from 'playwright-core';
import { afterAll, afterEach, beforeAll, describe, expect, inject, it, vi } from 'vitest';
import {
  accessibilityViolations,
  demoSignIns,
  newVisitor,
  openBrowser,
  pictureOfFailure,
  screenshot,
  settled,
  signIn,
  type Visitor,
} from './harness/browser';
import { syntheticLog } from './harness/synthetic-log';

const COLUMN = 'cap_port [kN]';
const HEADERS = { 'X-Requested-By': 'stayledger', 'Sec-Fetch-Site': 'same-origin' };

/** A vessel of its own with one posted log, made over HTTP: this journey is about what comes afterwards. */
async function vesselWithPostedLog(
  visitor: Visitor,
): Promise<{ vesselId: string; partId: string; logId: string }> {
  const { request } = visitor.context;
  const send = async (path: string, data: object) => {
    const reply = await request.post(`/api${path}`, { data, headers: HEADERS });
    if (!reply.ok()) throw new Error(`${path} answered ${reply.status()}: ${await reply.text()}`);
    return (await reply.json()) as { id: string; version: number; state: string };
  };
  const vessel = await send('/vessels', {
    name: 'Kittiwake of the Ledger',
    rigType: 'cutter',
    zone: 'Europe/Oslo',
    buildYear: 2012,
    useKind: 'private',
  });
  const position = await send(`/vessels/${vessel.id}/positions`, { kind: 'cap-shroud', side: 'port' });
  const wire = { constructionId: 'strand-1x19-316', upperTerminal: 'swaged', lowerTerminal: 'swaged' };
  const old = await send(`/positions/${position.id}/parts`, {
    ...wire,
    diameterMm: 7,
    fittedOn: '2012-05-01',
  });
  await send(`/parts/${old.id}/remove`, { version: old.version, removedOn: '2024-04-10', reason: 'Re-rig' });
  const part = await send(`/positions/${position.id}/parts`, {
    ...wire,
    diameterMm: 8,
    fittedOn: '2024-04-10',
  });
  const bytes = syntheticLog({ columns: [COLUMN], rows: 7200, startOn: '2026-06-14' });
  const log = await send(`/vessels/${vessel.id}/load-logs`, {
    fileName: 'evening-trial.csv',
    sizeBytes: bytes.length,
    mapping: {
      time: { column: 'time', format: 'iso' },
      channels: [{ column: COLUMN, unit: 'kN', positionId: position.id }],
    },
  });
  const tus = { ...HEADERS, 'Tus-Resumable': '1.0.0' };
  await request.post('/api/uploads', {
    headers: {
      ...tus,
      'Upload-Length': String(bytes.length),
      'Upload-Metadata': `loadLogId ${Buffer.from(log.id).toString('base64')}`,
    },
  });
  await request.patch(`/api/uploads/${log.id}`, {
    headers: { ...tus, 'Upload-Offset': '0', 'Content-Type': 'application/offset+octet-stream' },
    data: bytes,
  });
  const counted = await vi.waitFor(
    async () => {
      const now = (await (await request.get(`/api/load-logs/${log.id}`)).json()) as typeof log;
      if (now.state !== 'counted') throw new Error(`The log of this journey is still ${now.state}.`);
      return now;
    },
    { timeout: 60_000, interval: 200 },
  );
  await send(`/load-logs/${log.id}/post`, { version: counted.version });
  return { vesselId: vessel.id, partId: part.id, logId: log.id };
}

describe('a ledger that can be trusted', () => {
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

  it('is checked, corrected with evidence, taken back with a reason, and still holds', async () => {
    const { page } = visitor;
    const { surveyor } = await demoSignIns(visitor);
    await signIn(visitor, surveyor.email, surveyor.password);
    const { vesselId, partId, logId } = await vesselWithPostedLog(visitor);

    // The detail was opened and looked at: another factor, seen before it is kept.
    await page.goto(`/parts/${partId}`);
    await page.getByRole('link', { name: 'What each detail stands on, and who confirmed it' }).click();
    await page.getByRole('table', { name: 'Details and what they stand on' }).waitFor();
    await settled(page);
    await screenshot(page, 'ledger-1-details');
    expect(await accessibilityViolations(page)).toEqual([]);
    await page.getByRole('link', { name: 'Change the free length' }).click();
    await page.getByLabel('Curve', { exact: true }).selectOption('en-1993-1-11-105@1');
    await page.getByLabel('Evidence').fill('Certificate 4711 names bar, not strand.');
    await page.getByRole('button', { name: 'Show what it changes' }).click();
    await page.getByText(/entries are reversed by further entries/).waitFor();
    await settled(page);
    await screenshot(page, 'ledger-2-change-detail');
    expect(await accessibilityViolations(page)).toEqual([]);
    await page.getByRole('button', { name: 'Confirm with this evidence' }).click();
    await page.getByText('Certificate 4711 names bar, not strand.').first().waitFor();

    // The log turns out to be wrong.
    await page.goto(`/load-logs/${logId}`);
    await page.getByRole('button', { name: 'Take back from the ledger…' }).click();
    await page.getByLabel('Why is this log taken back?').fill('The load cell had slipped.');
    await screenshot(page, 'ledger-3-take-back');
    expect(await accessibilityViolations(page)).toEqual([]);
    await page.getByRole('button', { name: 'Take it back' }).click();
    await page.getByText('This log was posted and taken back by').waitFor();
    await settled(page);
    await screenshot(page, 'ledger-4-taken-back');

    await page.goto(`/parts/${partId}`);
    await page.getByRole('table', { name: 'Entries of this part’s account' }).waitFor();
    expect(await page.getByText('The load cell had slipped.').count()).toBeGreaterThan(3);
    await settled(page);
    await screenshot(page, 'ledger-5-entries');

    // Every hash and every amount, worked out again.
    await page.goto(`/vessels/${vesselId}`);
    await page.getByRole('link', { name: 'Check the ledger' }).click();
    await page.getByRole('button', { name: 'Check now' }).click();
    await page.getByText('Nothing differs.').waitFor();
    await settled(page);
    await screenshot(page, 'ledger-6-check');
    expect(await accessibilityViolations(page)).toEqual([]);

    // What was here before.
    await page.goto(`/parts/${partId}`);
    await page.getByRole('link', { name: 'Parts here through time' }).click();
    const history = page.getByRole('table', { name: 'Parts of Cap shroud, port through time' });
    await history.getByText('Re-rig').waitFor();
    await settled(page);
    await screenshot(page, 'ledger-7-position');
    expect(await accessibilityViolations(page)).toEqual([]);

    // The same on a phone at night.
    await page.setViewportSize({ width: 390, height: 844 });
    await page.emulateMedia({ colorScheme: 'dark' });
    for (const [name, address] of [
      ['ledger-8-phone-details', `/parts/${partId}/details`],
      ['ledger-9-phone-change', `/parts/${partId}/details/upper-terminal`],
      ['ledger-10-phone-position', new URL(page.url()).pathname],
    ]) {
      await page.goto(address);
      await page.getByRole('heading', { level: 1 }).waitFor();
      await settled(page);
      await screenshot(page, name);
      const wide = await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth);
      expect([name, wide > 0]).toEqual([name, false]);
    }
    await history.getByRole('link').last().click();
    await page.getByText('removed on 10').waitFor();
    expect(visitor.complaints).toEqual([]);
  });
});
