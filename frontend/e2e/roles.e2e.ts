import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, inject, it } from 'vitest';
import {
  demoSignIns,
  newVisitor,
  openBrowser,
  screenshot,
  settled,
  signIn,
  type Visitor,
} from './harness/browser';

describe('first pages of every role', () => {
  let browser: Browser;
  beforeAll(async () => {
    browser = await openBrowser();
  });
  afterAll(async () => {
    await browser?.close();
  });

  async function visitAs(role: string): Promise<Visitor> {
    const visitor = await newVisitor(browser, inject('baseUrl'));
    const { [role]: account } = await demoSignIns(visitor);
    await signIn(visitor, account.email, account.password);
    return visitor;
  }

  it('sends the signed-out to the sign-in page and back to where they wanted to go', async () => {
    const visitor = await newVisitor(browser, inject('baseUrl'));
    const { rigger } = await demoSignIns(visitor);
    await visitor.page.goto('/profile');
    await visitor.page.getByRole('heading', { level: 1, name: 'Sign in' }).waitFor();
    await visitor.page.getByLabel('E-mail address').fill(rigger.email);
    await visitor.page.getByLabel('Password').fill('not the password at all');
    await visitor.page.getByRole('button', { name: 'Sign in', exact: true }).click();
    await visitor.page.getByRole('alert').waitFor();
    await visitor.page.getByLabel('Password').fill(rigger.password);
    await visitor.page.getByRole('button', { name: 'Sign in', exact: true }).click();
    await visitor.page.waitForURL('**/profile');
    await visitor.context.close();
  });

  it('shows an owner their own vessel only, without percentages or jargon', async () => {
    const owner = await visitAs('owner');
    await owner.page.goto('/');
    await owner.page.waitForURL('**/my-vessel');
    await settled(owner.page);
    await screenshot(owner.page, 'owner-my-vessel');
    const words = await owner.page.getByRole('main').innerText();
    expect(words).not.toMatch(/%|damage sum|residue|median|rainflow/i);

    // A vessel of somebody else answers as one that does not exist.
    const surveyor = await visitAs('surveyor');
    const mine = (await (await owner.context.request.get('/api/vessels')).json()) as {
      items: { id: string }[];
    };
    const fleet = (await (await surveyor.context.request.get('/api/vessels')).json()) as {
      items: { id: string; name: string }[];
    };
    const foreign = fleet.items.find((vessel) => !mine.items.some((own) => own.id === vessel.id));
    expect(mine.items.length).toBeGreaterThan(0);
    expect(foreign).toBeDefined();
    await owner.page.goto(`/vessels/${foreign?.id ?? ''}`);
    await owner.page.getByRole('heading', { name: 'Not found' }).waitFor();
    const page = await owner.page.locator('body').innerText();
    expect(page).not.toContain(foreign?.name);
    expect(await owner.page.title()).not.toContain(foreign?.name);
    await owner.context.close();
    await surveyor.context.close();
  });

  it.each([
    ['surveyor', '**/fleet'],
    ['rigger', '**/fleet'],
    ['owner', '**/my-vessel'],
    ['insurer', '**/portfolio'],
    ['administrator', '**/administration'],
  ])('lands a %s on what they came for', async (role, address) => {
    const visitor = await visitAs(role);
    await visitor.page.goto('/');
    await visitor.page.waitForURL(address);
    await settled(visitor.page);
    await screenshot(visitor.page, `first-page-${role}`);
    expect(await visitor.page.getByRole('heading', { level: 1 }).count()).toBe(1);
    expect(visitor.complaints).toEqual([]);
    await visitor.context.close();
  });

  it('shows an insurer and an administrator no vessel data', async () => {
    for (const role of ['insurer', 'administrator']) {
      const visitor = await visitAs(role);
      const reply = await visitor.context.request.get('/api/vessels');
      expect(reply.status()).toBe(403);
      await visitor.context.close();
    }
  });
});
