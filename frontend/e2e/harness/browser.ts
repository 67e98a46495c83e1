import { mkdirSync, readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { chromium, type Browser, type BrowserContext, type Page } from 'playwright-core';

/** Debian's browser; `STAYLEDGER_CHROMIUM` names another. */
const EXECUTABLE = process.env.STAYLEDGER_CHROMIUM ?? '/usr/bin/chromium';

/** Folder for pictures of every page; without it only failures leave one, in the temporary folder. */
const SCREENSHOTS = process.env.STAYLEDGER_SCREENSHOTS;
const FAILURES = join(tmpdir(), 'stayledger-e2e-failures');

export function openBrowser(): Promise<Browser> {
  return chromium.launch({
    executablePath: EXECUTABLE,
    headless: true,
    args: ['--no-sandbox', '--disable-dev-shm-usage', '--force-color-profile=srgb'],
  });
}

export interface Visitor {
  context: BrowserContext;
  page: Page;
  /**
   * What the browser complained about: errors of the page and messages of the console at level error, among them every
   * refusal by the content security policy.
   */
  complaints: string[];
}

export interface VisitorOptions {
  width?: number;
  height?: number;
  theme?: 'light' | 'dark';
}

let visitors = 0;

/**
 * An address for each visitor, from the block reserved for benchmarks (RFC 2544). Sign-ins are limited per address: with
 * one address for all journeys the later ones would be taken for somebody who guesses.
 */
function nextAddress(): string {
  visitors += 1;
  return `198.18.${process.pid % 256}.${visitors % 256}`;
}

/** A person with a browser of their own: no cookie, no memory. */
export async function newVisitor(
  browser: Browser,
  baseUrl: string,
  options: VisitorOptions = {},
): Promise<Visitor> {
  const context = await browser.newContext({
    baseURL: baseUrl,
    viewport: { width: options.width ?? 1280, height: options.height ?? 900 },
    colorScheme: options.theme ?? 'light',
    reducedMotion: 'reduce',
    locale: 'en-GB',
    timezoneId: 'Pacific/Chatham',
    extraHTTPHeaders: { 'X-Forwarded-For': nextAddress() },
  });
  context.setDefaultTimeout(20_000);
  const page = await context.newPage();
  const complaints: string[] = [];
  page.on('pageerror', (error) => complaints.push(`page error: ${error.message}`));
  page.on('console', (message) => {
    if (message.type() === 'error') complaints.push(message.text());
  });
  return { context, page, complaints };
}

/** Signs in over HTTP, as the page would, so that a journey about something else need not type a password. */
export async function signIn(visitor: Visitor, email: string, password: string): Promise<void> {
  const reply = await visitor.context.request.post('/api/auth/sign-in', {
    data: { email, password },
    headers: { 'X-Requested-By': 'stayledger', 'Sec-Fetch-Site': 'same-origin' },
  });
  if (!reply.ok()) throw new Error(`Sign-in of ${email} answered ${reply.status()}: ${await reply.text()}`);
}

export interface DemoSignIn {
  email: string;
  password: string;
  role: string;
  name: string;
}

/** The accounts the sign-in page itself offers. */
export async function demoSignIns(visitor: Visitor): Promise<Record<string, DemoSignIn>> {
  const reply = await visitor.context.request.get('/api/auth/demo-sign-ins');
  const { items } = (await reply.json()) as { items: DemoSignIn[] };
  return Object.fromEntries(items.map((item) => [item.role, item]));
}

const axeSource = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');

/** Violations of WCAG 2.2 A and AA and of good practice on the page as it stands, one readable line each. */
export async function accessibilityViolations(page: Page): Promise<string[]> {
  await page.evaluate(axeSource);
  return page.evaluate(async () => {
    interface AxeResult {
      violations: { id: string; help: string; nodes: { target: string[]; failureSummary?: string }[] }[];
    }
    const axe = (globalThis as unknown as { axe: { run(options: object): Promise<AxeResult> } }).axe;
    const { violations } = await axe.run({ resultTypes: ['violations'] });
    return violations.map(
      ({ id, help, nodes }) =>
        `${id}: ${help} (${nodes
          .slice(0, 3)
          .map((node) => `${node.target.join(' ')} ${node.failureSummary ?? ''}`)
          .join('; ')})`,
    );
  });
}

/** A picture of the whole page, where somebody asked for pictures. */
export async function screenshot(page: Page, name: string): Promise<void> {
  if (SCREENSHOTS) await savePicture(page, SCREENSHOTS, name);
}

/** A picture of the page on which a journey failed. */
export async function pictureOfFailure(page: Page, test: string): Promise<void> {
  await savePicture(page, SCREENSHOTS ?? FAILURES, `failed-${test.replaceAll(/\W+/g, '-')}`);
}

async function savePicture(page: Page, folder: string, name: string): Promise<void> {
  mkdirSync(folder, { recursive: true });
  await page.screenshot({ path: join(folder, `${name}.png`), fullPage: true });
}

/** Waits until the page has nothing more to fetch and no part of it says that it is loading. */
export async function settled(page: Page): Promise<void> {
  await page.waitForLoadState('networkidle');
  await page.waitForFunction(
    () =>
      ![...document.querySelectorAll('[role="status"]')].some((status) => status.textContent.includes('…')),
  );
}
