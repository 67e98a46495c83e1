import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, inject, it } from 'vitest';
import {
  accessibilityViolations,
  demoSignIns,
  newVisitor,
  openBrowser,
  settled,
  signIn,
  type Visitor,
} from './harness/browser';
import { choose } from './harness/fields';

const NAME = 'Bench series of the journey';

describe('rig drawing, reference data and help', () => {
  let browser: Browser;
  beforeAll(async () => {
    browser = await openBrowser();
  });
  afterAll(async () => {
    await browser?.close();
  });

  async function visitAs(role: string, theme: 'light' | 'dark' = 'light'): Promise<Visitor> {
    const visitor = await newVisitor(browser, inject('baseUrl'), { theme });
    const { [role]: account } = await demoSignIns(visitor);
    await signIn(visitor, account.email, account.password);
    return visitor;
  }

  it('picks a part on the drawing with the keyboard and opens it', async () => {
    const visitor = await visitAs('rigger');
    const { page } = visitor;
    const { items } = (await (await visitor.context.request.get('/api/vessels')).json()) as {
      items: { id: string; counts: { assessed: number } }[];
    };
    const vessel = items.find(({ counts }) => counts.assessed > 0) ?? items[0];
    await page.goto(`/vessels/${vessel.id}`);
    const drawing = page.getByRole('listbox', { name: /on the drawing/ });
    await drawing.focus();
    await page.keyboard.press('End');
    const last = drawing.getByRole('option').last();
    expect(await last.getAttribute('aria-selected')).toBe('true');
    await page.keyboard.press('Home');
    const label = (await drawing.getByRole('option').first().getAttribute('aria-label')) ?? '';
    expect(await accessibilityViolations(page)).toEqual([]);
    await page.keyboard.press('Enter');
    await page.getByRole('heading', { level: 1, name: label.split(':')[0] }).waitFor();
    expect(visitor.complaints).toEqual([]);
    await visitor.context.close();
  });

  it("keeps a firm's own curve to that firm", async () => {
    const rigger = await visitAs('rigger');
    const { page } = rigger;
    await page.goto('/reference');
    await page.getByRole('link', { name: 'Add a curve' }).click();
    await page.getByLabel('Called').fill(NAME);
    await page.getByLabel('What was tested').fill('1x19 strand with swaged eyes');
    await page.getByLabel('Range at two million cycles').fill('84,5');
    await page.getByLabel('Slope m').fill('5');
    await page.getByLabel('Standard deviations below the mean').fill('2');
    await page.getByRole('textbox', { name: 'Source' }).fill('Invented for this journey');
    await choose(page, 'How the figures came here', 'An estimate of ours, without a source');
    await page.getByLabel('Read or made how').fill('Made up.');
    await page.getByLabel('How far from the part it will serve').fill('Not for use.');
    await page.getByRole('button', { name: 'Add the curve' }).click();
    await page.getByRole('heading', { level: 1, name: NAME }).waitFor();
    const address = new URL(page.url()).pathname;
    await settled(page);
    expect(await page.getByText('Added by').count()).toBe(1);
    await page.goto('/reference');
    await page
      .getByRole('region', { name: 'Added by your firm' })
      .getByRole('link', { name: NAME })
      .waitFor();
    expect(rigger.complaints).toEqual([]);
    await rigger.context.close();

    const insurer = await visitAs('insurer');
    await insurer.page.goto('/reference');
    await insurer.page.getByRole('heading', { name: 'Constructions' }).waitFor();
    expect(await insurer.page.getByText(NAME).count()).toBe(0);
    await insurer.page.goto(address);
    await insurer.page.getByRole('heading', { name: 'Not found' }).waitFor();
    await insurer.context.close();
  });

  it('prints the rig on white without controls, whatever the screen shows', async () => {
    const visitor = await visitAs('rigger', 'dark');
    const { page } = visitor;
    const { items } = (await (await visitor.context.request.get('/api/vessels')).json()) as {
      items: { id: string }[];
    };
    await page.goto(`/vessels/${items[0].id}`);
    await page.getByRole('listbox', { name: /on the drawing/ }).waitFor();
    await page.emulateMedia({ media: 'print' });
    expect(await page.evaluate(() => getComputedStyle(document.body).backgroundColor)).toBe(
      'rgb(255, 255, 255)',
    );
    expect(await page.getByRole('listbox', { name: /on the drawing/ }).isVisible()).toBe(true);
    expect(await page.getByRole('table').first().isVisible()).toBe(true);
    expect(await page.getByRole('navigation').count()).toBe(0);
    expect(await page.getByRole('button', { name: 'Sign out' }).count()).toBe(0);
    expect(await page.getByRole('link', { name: 'Add a position' }).count()).toBe(0);
    await visitor.context.close();
  });

  it.each(['surveyor', 'rigger', 'owner', 'insurer', 'administrator'])('helps a %s', async (role) => {
    const visitor = await visitAs(role);
    await visitor.page.goto('/');
    await visitor.page.getByRole('link', { name: 'Help' }).click();
    await visitor.page.getByRole('heading', { level: 2, name: `For ${role}s` }).waitFor();
    expect(visitor.complaints).toEqual([]);
    await visitor.context.close();
  });
});
