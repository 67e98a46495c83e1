import type { Browser, Page } from 'playwright-core';
import { afterAll, afterEach, beforeAll, describe, expect, inject, it } from 'vitest';
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

const PLANNED_WITHIN_MS = 60_000;
const headers = { 'X-Requested-By': 'stayledger', 'Sec-Fetch-Site': 'same-origin' };

/** Pixels by which the page is wider than the screen. */
function overflow(page: Page): Promise<number> {
  return page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth);
}

describe('the re-rig schedule', () => {
  let browser: Browser;
  let rigger: Visitor;
  let owner: Visitor;

  beforeAll(async () => {
    browser = await openBrowser();
    rigger = await newVisitor(browser, inject('baseUrl'));
    owner = await newVisitor(browser, inject('baseUrl'), { width: 390, height: 844, theme: 'dark' });
    const people = await demoSignIns(rigger);
    await signIn(rigger, people.rigger.email, people.rigger.password);
    await signIn(owner, people.owner.email, people.owner.password);
  });
  afterEach(async ({ task }) => {
    if (task.result?.state !== 'fail') return;
    await pictureOfFailure(rigger.page, `${task.name} rigger`);
    await pictureOfFailure(owner.page, `${task.name} owner`);
  });
  afterAll(async () => {
    await browser?.close();
  });

  it('is planned, moved, undone and proposed by the rigger, and answered by the owner on a phone', async () => {
    const reply = await owner.context.request.get('/api/vessels?limit=50');
    const { items } = (await reply.json()) as { items: { id: string; name: string }[] };
    const [vessel] = items;
    const { page } = rigger;
    await page.goto(`/vessels/${vessel.id}/rerig-schedule`);
    await page.getByRole('link', { name: 'Re-rig schedule' }).waitFor();
    await page.getByRole('button', { name: /^Plan (the re-rig|anew)$/ }).click();
    await page.getByText('Planning…').waitFor();
    await page.getByText('Planning…').waitFor({ state: 'detached', timeout: PLANNED_WITHIN_MS });
    await settled(page);
    await screenshot(page, 'rerig-1-plan');
    expect(await accessibilityViolations(page)).toEqual([]);
    const costBefore = await page.getByText(/visits?, about/).innerText();

    const change = page.getByText(/^Change the visit of/).first();
    await change.click();
    await page.getByRole('button', { name: 'Drop' }).first().click();
    await page.getByText('Planning…').waitFor();
    await page.getByText('Planning…').waitFor({ state: 'detached', timeout: PLANNED_WITHIN_MS });
    await page.getByRole('heading', { name: 'What changed' }).waitFor();
    await screenshot(page, 'rerig-2-changed');
    await page.getByRole('button', { name: /^Undo/ }).click();
    await page.getByText(costBefore).waitFor();

    const download = page.waitForEvent('download');
    await page.getByRole('link', { name: 'Calendar file' }).click();
    expect((await download).suggestedFilename()).toContain('.ics');
    await page.getByRole('button', { name: 'Propose to the owner' }).click();
    await page.getByText(/^Proposed to the owner: plan/).waitFor();

    await owner.page.goto(`/my-vessel?vessel=${vessel.id}`);
    const visit = owner.page.getByRole('region', { name: 'The next visit to the yard' });
    await visit.waitFor();
    await screenshot(owner.page, 'rerig-3-owner');
    expect(await accessibilityViolations(owner.page)).toEqual([]);
    await visit.getByLabel(/^Or ask/).fill('Can the mast stay up?');
    await visit.getByRole('button', { name: 'Ask' }).click();
    await visit.getByText('You asked: Can the mast stay up?').waitFor();
    await page.reload();
    await page.getByText('The owner asks: Can the mast stay up?').waitFor();

    await page.setViewportSize({ width: 390, height: 844 });
    await screenshot(page, 'rerig-4-phone');
    expect(await overflow(page)).toBeLessThanOrEqual(0);
    await page.goto('/yard-terms');
    await page.getByRole('heading', { level: 1, name: 'Prices and seasons of the yard' }).waitFor();
    await screenshot(page, 'rerig-5-terms');
    expect(await overflow(page)).toBeLessThanOrEqual(0);
    expect(await accessibilityViolations(page)).toEqual([]);
    expect([...rigger.complaints, ...owner.complaints]).toEqual([]);
    // Nothing is left behind for the journeys that follow.
    const schedule = (await (
      await rigger.context.request.get(`/api/vessels/${vessel.id}/rerig-schedule`)
    ).json()) as { version: number };
    const back = await rigger.context.request.post(`/api/vessels/${vessel.id}/rerig-schedule/state`, {
      data: { version: schedule.version, state: 'draft' },
      headers,
    });
    expect(back.status()).toBe(200);
  });
});
