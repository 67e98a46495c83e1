import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, inject, it } from 'vitest';
import { demoSignIns, newVisitor, openBrowser, settled, signIn } from './harness/browser';
import { syntheticLog } from './harness/synthetic-log';

/** Presses Tab until what has the focus is called so, as somebody without a mouse would. */
async function tabTo(page: Page, name: string | RegExp, limit = 60): Promise<void> {
  const wanted =
    typeof name === 'string' ? (text: string) => text === name : (text: string) => name.test(text);
  for (let presses = 0; presses < limit; presses += 1) {
    await page.keyboard.press('Tab');
    const focused = await page.evaluate(() => {
      const element = document.activeElement;
      const label = element instanceof HTMLInputElement ? element.labels?.[0]?.textContent : null;
      return (label ?? element?.getAttribute('aria-label') ?? element?.textContent ?? '').trim();
    });
    if (wanted(focused)) return;
  }
  throw new Error(`Tab did not reach ${String(name)} in ${limit} presses.`);
}

/** Whether what has the focus shows it: an outline of some width. */
function focusIsVisible(page: Page): Promise<boolean> {
  return page.evaluate(() => {
    const element = document.activeElement;
    if (!element || element === document.body) return false;
    const { outlineStyle, outlineWidth } = getComputedStyle(element);
    return outlineStyle !== 'none' && parseFloat(outlineWidth) > 0;
  });
}

/** Opens the list of the field in focus with an arrow and goes down it until the wanted choice is the active one. */
async function chooseTyped(page: Page, label: RegExp, option: string): Promise<void> {
  await tabTo(page, label);
  await page.keyboard.press('ArrowDown');
  const active = page.locator(
    '.ant-select-dropdown:not(.ant-select-dropdown-hidden) .ant-select-item-option-active',
  );
  for (let presses = 0; presses < 40; presses += 1) {
    if ((await active.getAttribute('title')) === option) {
      await page.keyboard.press('Enter');
      return;
    }
    await page.keyboard.press('ArrowDown');
  }
  throw new Error(`The arrows did not reach ${option}.`);
}

async function typeInto(page: Page, label: RegExp, text: string): Promise<void> {
  await tabTo(page, label);
  await page.keyboard.type(text);
}

async function pressButton(page: Page, name: string): Promise<void> {
  await tabTo(page, name);
  await page.keyboard.press('Enter');
}

describe('without a mouse', () => {
  let browser: Browser;
  beforeAll(async () => {
    browser = await openBrowser();
  });
  afterAll(async () => {
    await browser?.close();
  });

  it('signs in, opens a vessel of the fleet and reads a part', async () => {
    const visitor = await newVisitor(browser, inject('baseUrl'));
    const { page } = visitor;
    const { rigger } = await demoSignIns(visitor);
    await page.goto('/');
    await page.getByRole('heading', { name: 'Sign in' }).waitFor();
    await tabTo(page, 'E-mail address');
    await page.keyboard.type(rigger.email);
    await tabTo(page, 'Password');
    await page.keyboard.type(rigger.password);
    await page.keyboard.press('Enter');
    await page.getByRole('heading', { level: 1, name: 'Fleet' }).waitFor();
    await settled(page);

    const firstVessel = await page
      .getByRole('table', { name: 'Vessels' })
      .getByRole('link')
      .first()
      .innerText();
    await tabTo(page, firstVessel.trim());
    expect(await focusIsVisible(page)).toBe(true);
    await page.keyboard.press('Enter');
    await page.getByRole('navigation', { name: /^Pages of/ }).waitFor();
    await settled(page);

    const firstPart = await page.getByRole('table').getByRole('link').first().innerText();
    await tabTo(page, firstPart.trim());
    await page.keyboard.press('Enter');
    await page.getByRole('heading', { name: 'Details' }).waitFor();
    expect(visitor.complaints).toEqual([]);
    await visitor.context.close();
  });

  it('registers a vessel, fits a part, adds a load log and posts it', async () => {
    const visitor = await newVisitor(browser, inject('baseUrl'));
    const { page } = visitor;
    const { rigger } = await demoSignIns(visitor);
    await signIn(visitor, rigger.email, rigger.password);
    await page.goto('/fleet');
    await page.getByRole('heading', { level: 1, name: 'Fleet' }).waitFor();
    await pressButton(page, 'Register a vessel');

    await page.getByRole('heading', { level: 1, name: 'Register a vessel' }).waitFor();
    await typeInto(page, /^Name/, 'Keys of the Skerries');
    await chooseTyped(page, /^Rig/, 'Cutter');
    await pressButton(page, 'Register vessel');
    await page.getByRole('heading', { level: 1, name: 'Keys of the Skerries' }).waitFor();

    await pressButton(page, 'Add a position');
    await page.getByRole('heading', { level: 1, name: /position/ }).waitFor();
    await chooseTyped(page, /^Place on the rig/, 'Forestay');
    await pressButton(page, 'Add position');

    await page.getByRole('heading', { level: 1, name: /^Fit a part/ }).waitFor();
    await chooseTyped(page, /^Construction/, '1x19 strand, stainless 316');
    await chooseTyped(page, /^Diameter/, '8 mm');
    // A day is typed, part by part; day and month alike, since their order is the browser's own.
    await typeInto(page, /^Fitted on/, '05052024');
    await pressButton(page, 'Fit this part');
    await page.getByRole('heading', { level: 1, name: 'Forestay', exact: true }).waitFor();
    await settled(page);
    expect(await page.getByRole('main').innerText()).toMatch(/2024-05-05|5.May.2024/);

    const { items } = (await (await visitor.context.request.get('/api/vessels?q=Keys')).json()) as {
      items: { id: string }[];
    };
    await page.goto(`/vessels/${items[0].id}/load-logs`);
    await page.getByRole('heading', { name: 'No load logs yet' }).waitFor();
    await pressButton(page, 'Add load log');
    await page.getByRole('heading', { level: 1, name: /load log/ }).waitFor();
    const chooser = page.waitForEvent('filechooser');
    await tabTo(page, /^Drop a load log here/);
    await page.keyboard.press('Enter');
    await (
      await chooser
    ).setFiles({
      name: 'keys.csv',
      mimeType: 'text/csv',
      buffer: syntheticLog({ columns: ['forestay [kN]'], rows: 900, startOn: '2026-05-02' }),
    });
    await page.getByText('parted by commas').waitFor();
    // A list of the browser itself: the first letters find the choice.
    await typeInto(page, /^Position of column forestay/, 'Forestay');
    await pressButton(page, 'Start upload');
    await page.getByRole('heading', { name: 'Findings' }).waitFor({ timeout: 60_000 });
    await settled(page);
    await pressButton(page, 'Post to ledger');
    await page.getByText(/^Posted by/).waitFor();
    expect(visitor.complaints).toEqual([]);
    await visitor.context.close();
  });
});
