import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, inject, it } from 'vitest';
import {
  accessibilityViolations,
  demoSignIns,
  newVisitor,
  openBrowser,
  screenshot,
  settled,
  signIn,
  type Visitor,
} from './harness/browser';
import { choose } from './harness/fields';

const FILE = [
  'place,side,mast,construction,diameter_mm,fitted_on',
  'forestay,centre,main,strand-1x19-316,10,2024-04-01',
  'babystay,centre,main,strand-1x19-316,8,2024-04-01',
];

describe('filling the register', () => {
  let browser: Browser;
  let visitor: Visitor;
  let vesselId: string;
  beforeAll(async () => {
    browser = await openBrowser();
    visitor = await newVisitor(browser, inject('baseUrl'));
    const { rigger } = await demoSignIns(visitor);
    await signIn(visitor, rigger.email, rigger.password);
    const reply = await visitor.context.request.post('/api/vessels', {
      data: { name: 'Register journey', rigType: 'ketch', zone: 'Europe/Oslo', lengthM: 16 },
      headers: { 'X-Requested-By': 'stayledger', 'Sec-Fetch-Site': 'same-origin' },
    });
    vesselId = ((await reply.json()) as { id: string }).id;
  });
  afterAll(async () => {
    await browser?.close();
  });

  it('makes a rig from its type, reads a file line by line, and fits a pair at once', async () => {
    const { page } = visitor;
    await page.goto(`/vessels/${vesselId}`);
    await page.getByRole('link', { name: 'Add many places at once' }).click();
    await page.getByRole('button', { name: 'Create these places' }).click();
    await page
      .getByRole('row', { name: /Bobstay/ })
      .first()
      .waitFor();

    await page.getByRole('link', { name: 'Add many places at once' }).click();
    const file = (lines: string[]) => ({
      name: 'rig.csv',
      mimeType: 'text/csv',
      buffer: Buffer.from(lines.join('\n')),
    });
    const field = page.getByLabel('File to read');
    await field.setInputFiles(file([...FILE, 'backstay,left,main,,,']));
    await page.getByText(/1 of 3 lines is wrong/).waitFor();
    expect(await page.getByRole('button', { name: 'Take these lines over' }).isDisabled()).toBe(true);
    await field.setInputFiles(file(FILE));
    await page.getByText(/2 lines read, none wrong/).waitFor();
    await page.getByRole('button', { name: 'Take these lines over' }).click();
    await page
      .getByRole('row', { name: /Babystay/ })
      .first()
      .waitFor();

    await page.getByRole('link', { name: 'Fit a part at Cap shroud, port', exact: true }).click();
    await choose(page, 'Construction', '1x19 strand, stainless 316');
    await choose(page, 'Diameter', '10 mm');
    await choose(page, 'Upper terminal', 'Swaged terminal');
    await page.getByText(/the assembly breaks at .* set by the upper terminal/).waitFor();
    await page.getByLabel('Fit the same on the other side').check();
    await page.getByRole('button', { name: 'Fit this part' }).click();
    await page.waitForURL(/\/parts\//);
    const rig = (await (await visitor.context.request.get(`/api/vessels/${vesselId}/rig`)).json()) as {
      items: { label: string; part: { diameterMm: number } | null }[];
    };
    const fitted = rig.items.filter(({ part }) => part !== null).map(({ label }) => label);
    expect(fitted).toEqual(
      expect.arrayContaining(['Forestay', 'Babystay', 'Cap shroud, port', 'Cap shroud, starboard']),
    );
    expect(visitor.complaints).toEqual([]);
  });

  it('registers a sensor, its check, and says what that gives the other side', async () => {
    const { page } = visitor;
    await page.goto(`/vessels/${vesselId}/sensors/new`);
    await page.getByLabel('Name', { exact: true }).fill('Pin P');
    await choose(page, 'Measures the load of', 'Cap shroud, port');
    await page.getByRole('button', { name: 'Add sensor' }).click();
    await page.getByRole('link', { name: 'Record a check of Pin P' }).click();
    await page.getByLabel('The sensor showed').fill('0.2');
    await choose(page, 'The rig stood', 'slack');
    await page.getByRole('button', { name: 'Record it' }).click();
    await page.getByText(/Zero check on .* showed 0\.2/).waitFor();
    await page.goto(`/vessels/${vesselId}`);
    const table = page.getByRole('table', { name: /Where the loads/ });
    await table.getByText('Can be mirrored from Cap shroud, port').waitFor();
    expect(visitor.complaints).toEqual([]);
  });

  it('keeps a corrected geometry and starts a sister vessel', async () => {
    const { page } = visitor;
    await page.goto(`/vessels/${vesselId}/rig/geometry`);
    await page.getByLabel('Beam').fill('4.4');
    await page.getByRole('button', { name: 'Save geometry' }).click();
    await page.waitForURL(new RegExp(`/vessels/${vesselId}$`));
    await page.getByRole('link', { name: 'Register a sister vessel' }).click();
    await page.getByLabel('Name of the sister vessel').fill('Register journey, sister');
    await page.getByRole('button', { name: 'Register the sister vessel' }).click();
    await page.getByRole('heading', { name: 'Register journey, sister' }).waitFor();
    const sisterId = page.url().split('/').at(-1) ?? '';
    const drawn = (await (
      await visitor.context.request.get(`/api/vessels/${sisterId}/rig/geometry`)
    ).json()) as { geometry: { beamM: number } };
    expect(drawn.geometry.beamM).toBe(4.4);
    expect(visitor.complaints).toEqual([]);
  });

  it.each([
    { theme: 'light', width: 1280 },
    { theme: 'dark', width: 320 },
  ] as const)('reads well in $theme at $width', async ({ theme, width }) => {
    const other = await newVisitor(browser, inject('baseUrl'), { theme, width });
    const { rigger } = await demoSignIns(other);
    await signIn(other, rigger.email, rigger.password);
    const found: Record<string, string[]> = {};
    for (const place of ['', '/rig/start', '/rig/geometry', '/sister', '/sensors', '/sensors/new']) {
      await other.page.goto(`/vessels/${vesselId}${place}`);
      await settled(other.page);
      await screenshot(other.page, `register${place.replaceAll('/', '-')}-${theme}-${width}`);
      const violations = await accessibilityViolations(other.page);
      const overflow = await other.page.evaluate(
        () => document.documentElement.scrollWidth - document.documentElement.clientWidth,
      );
      if (overflow > 0) violations.push(`wider than the window by ${overflow} px`);
      if (violations.length > 0) found[place] = violations;
    }
    expect(found).toEqual({});
    expect(other.complaints).toEqual([]);
    await other.context.close();
  });
});
