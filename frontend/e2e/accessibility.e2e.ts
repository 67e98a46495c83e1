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
} from './harness/browser';

const LOOKS = [
  { theme: 'light', width: 1280 },
  { theme: 'light', width: 320 },
  { theme: 'dark', width: 1280 },
  { theme: 'dark', width: 320 },
] as const;

interface Place {
  name: string;
  address: string;
}

/** Pages of a role, found through the API, so that the list follows the demo. */
async function placesOf(role: string, get: (path: string) => Promise<unknown>): Promise<Place[]> {
  if (role === 'signed-out') return [{ name: 'sign-in', address: '/sign-in' }];
  const profile = { name: `${role}-profile`, address: '/profile' };
  const notFound = { name: `${role}-not-found`, address: '/nowhere' };
  const help = { name: `${role}-help`, address: '/help' };
  if (role === 'insurer') return [{ name: 'portfolio', address: '/portfolio' }, profile, help];
  if (role === 'administrator') {
    const views = ['users', 'firms', 'jobs', 'audit'].map((view) => ({
      name: `administration-${view}`,
      address: `/administration?view=${view}`,
    }));
    return [...views, profile, help];
  }
  const { items: vessels } = (await get('/api/vessels')) as {
    items: { id: string; counts: { assessed: number; logsWaiting: number } }[];
  };
  const [first] = vessels;
  if (role === 'owner') {
    const { items } = (await get(`/api/vessels/${first.id}/rig`)) as {
      items: { part: { id: string } | null }[];
    };
    const part = items.find((position) => position.part !== null)?.part;
    return [
      { name: 'my-vessel', address: '/my-vessel' },
      { name: 'owner-vessel', address: `/vessels/${first.id}` },
      { name: 'owner-loads', address: `/vessels/${first.id}/load-logs` },
      { name: 'owner-part', address: `/parts/${part?.id ?? ''}` },
      help,
      profile,
    ];
  }
  const places: Place[] = [
    { name: 'fleet', address: '/fleet' },
    { name: 'register-vessel', address: '/vessels/new' },
    { name: 'reference', address: '/reference' },
    { name: 'curve', address: '/reference/curves/api-rp-2sk-spiral-strand' },
    { name: 'add-curve', address: '/reference/curves/new' },
    { name: 'add-construction', address: '/reference/constructions/new' },
    help,
    profile,
    notFound,
  ];
  places.push(
    { name: 'vessel-edit', address: `/vessels/${first.id}/edit` },
    { name: 'usage-plan', address: `/vessels/${first.id}/usage-plan` },
    { name: 'add-position', address: `/vessels/${first.id}/positions/new` },
    { name: 'add-load-log', address: `/vessels/${first.id}/load-logs/new` },
  );
  const seenStates = new Set<string>();
  const seenStandings = new Set<string>();
  for (const vessel of vessels) {
    const logs = (await get(`/api/vessels/${vessel.id}/load-logs`)) as {
      items: { id: string; state: string }[];
    };
    for (const log of logs.items) {
      if (seenStates.has(log.state)) continue;
      seenStates.add(log.state);
      places.push({ name: `load-log-${log.state}`, address: `/load-logs/${log.id}` });
      if (seenStates.size === 1) places.push({ name: 'loads', address: `/vessels/${vessel.id}/load-logs` });
    }
    const rig = (await get(`/api/vessels/${vessel.id}/rig`)) as {
      items: { id: string; part: { id: string; standing: { assessment: string; due: string } } | null }[];
    };
    for (const { part } of rig.items) {
      if (part === null) continue;
      const standing = `${part.standing.assessment}-${part.standing.due}`;
      if (seenStandings.has(standing)) continue;
      seenStandings.add(standing);
      places.push({ name: `part-${standing}`, address: `/parts/${part.id}` });
      if (seenStandings.size === 1) {
        places.push(
          { name: 'vessel-rig', address: `/vessels/${vessel.id}` },
          { name: 'part-edit', address: `/parts/${part.id}/edit` },
          { name: 'part-remove', address: `/parts/${part.id}/remove` },
        );
      }
    }
  }
  return places;
}

describe.each(['signed-out', 'rigger', 'owner', 'insurer', 'administrator'])('pages of a %s', (role) => {
  let browser: Browser;
  beforeAll(async () => {
    browser = await openBrowser();
  });
  afterAll(async () => {
    await browser?.close();
  });

  it.each(LOOKS)(
    'have no accessibility violation in $theme at $width px, and fit the width',
    async ({ theme, width }) => {
      const visitor = await newVisitor(browser, inject('baseUrl'), { theme, width });
      if (role !== 'signed-out') {
        const { [role]: account } = await demoSignIns(visitor);
        await signIn(visitor, account.email, account.password);
      }
      const get = async (path: string): Promise<unknown> => (await visitor.context.request.get(path)).json();
      const found: string[] = [];
      for (const { name, address } of await placesOf(role, get)) {
        await visitor.page.goto(address);
        await visitor.page.getByRole('heading', { level: 1 }).first().waitFor();
        await settled(visitor.page);
        await screenshot(visitor.page, `${name}-${theme}-${width}`);
        const violations = await accessibilityViolations(visitor.page);
        found.push(...violations.map((violation) => `${name}: ${violation}`));
        const overflow = await visitor.page.evaluate(
          () => document.documentElement.scrollWidth - document.documentElement.clientWidth,
        );
        if (overflow > 0) found.push(`${name}: ${overflow} px wider than the screen`);
      }
      expect(found).toEqual([]);
      expect(visitor.complaints).toEqual([]);
      await visitor.context.close();
    },
  );
});
