import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, inject, it } from 'vitest';
import { demoSignIns, newVisitor, openBrowser, settled } from './harness/browser';

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
});
