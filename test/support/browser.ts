import { readFileSync } from 'node:fs';
import path from 'node:path';
import { type Browser, type BrowserContext, type Page, chromium } from 'playwright-core';
import { productUrl } from './product-url';

const ROOT = path.resolve(__dirname, '../..');
const CHROMIUM = '/usr/bin/chromium';
const FLAGS = [
  ...['--no-sandbox', '--disable-quic', '--no-first-run', '--disable-background-networking'],
  ...['--disable-component-update', '--disable-sync', '--use-angle=swiftshader', '--enable-unsafe-swiftshader'],
];
/** Patience for one step on a busy machine. */
export const STEP_MS = 60_000;

export type DemoRole = 'owner' | 'fabricator' | 'viewer' | 'customer' | 'operator';

interface Person {
  readonly role: DemoRole;
  readonly email: string;
  readonly password: string;
}

const { people } = JSON.parse(readFileSync(path.join(ROOT, 'server/src/setup/demo/people.json'), 'utf8')) as {
  readonly people: readonly Person[];
};

/** The demo person of a role. */
export function personOf(role: DemoRole): Person {
  const person = people.find((one) => one.role === role);
  if (person === undefined) throw new Error(`The demo has no ${role}.`);
  return person;
}

export function launchBrowser(): Promise<Browser> {
  return chromium.launch({ executablePath: CHROMIUM, headless: true, timeout: STEP_MS, args: FLAGS });
}

/** A browser tab that keeps note of everything that must not happen. */
export interface Tab {
  readonly page: Page;
  readonly context: BrowserContext;
  /** Errors in the console, uncaught exceptions, breaches of the page's policy, requests to other hosts. */
  readonly faults: readonly string[];
}

export interface TabOptions {
  readonly width?: number;
  readonly height?: number;
  readonly theme?: 'light' | 'dark';
  /** What the test provokes and the browser itself tells in the console: a status, or the name of an error. */
  readonly provoked?: readonly (number | 'ERR_INTERNET_DISCONNECTED')[];
}

/** Reports breaches of the content security policy like exceptions, which are noted. */
function tellPolicyBreaches(): void {
  document.addEventListener('securitypolicyviolation', ({ violatedDirective, blockedURI }) =>
    reportError(new Error(`policy breach: ${violatedDirective}, ${blockedURI}`)),
  );
}

export async function openTab(
  browser: Browser,
  baseUrl: string,
  { width = 1280, height = 860, theme = 'light', provoked = [] }: TabOptions = {},
): Promise<Tab> {
  const context = await browser.newContext({
    viewport: { width, height },
    colorScheme: theme,
    reducedMotion: 'reduce',
    acceptDownloads: true,
    baseURL: baseUrl,
  });
  context.setDefaultTimeout(STEP_MS);
  await context.addInitScript(tellPolicyBreaches);
  const page = await context.newPage();
  const isProvoked = (words: string): boolean =>
    provoked.some((one) => words.includes(` ${one} `) || words.endsWith(`::${one}`));
  const faults: string[] = [];
  page.on('pageerror', (error) => faults.push(`exception: ${error.message}`));
  page.on('console', (message) => {
    if (message.type() === 'error' && !isProvoked(message.text())) faults.push(`console: ${message.text()}`);
  });
  page.on('request', (request) => {
    const { protocol, hostname } = new URL(request.url());
    if (/^https?:$/.test(protocol) && hostname !== '127.0.0.1') faults.push(`request to ${hostname}`);
  });
  return { page, context, faults };
}

/** Signs a demo person in by the form and waits for what they see first. */
export async function signIn(page: Page, role: DemoRole): Promise<void> {
  const { email, password } = personOf(role);
  await page.goto('/sign-in');
  await page.getByLabel('E-mail').fill(email);
  await page.getByLabel('Password', { exact: true }).fill(password);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.waitForURL((url) => !url.pathname.includes('sign-in'));
}

/** One browser for all tests of a file; after each test its tabs are closed and asked for faults. */
export interface BrowserOfFile {
  /** Opens a tab, signed in when a role is named. */
  open(role: DemoRole | null, options?: TabOptions): Promise<Tab>;
}

/** Registers what a file of journeys needs; to be called once inside its outermost `describe`. */
export function useBrowser(): BrowserOfFile {
  const tabs: Tab[] = [];
  let browser: Browser | undefined;
  beforeAll(async () => {
    browser = await launchBrowser();
  }, STEP_MS);
  afterEach(async () => {
    const closing = tabs.splice(0);
    await Promise.all(closing.map(({ context }) => context.close()));
    expect(closing.flatMap(({ faults }) => faults)).toEqual([]);
  }, STEP_MS);
  afterAll(async () => {
    await browser?.close();
  }, STEP_MS);
  return {
    async open(role, options) {
      if (browser === undefined) throw new Error('The browser has not started.');
      const tab = await openTab(browser, productUrl(), options);
      tabs.push(tab);
      if (role !== null) await signIn(tab.page, role);
      return tab;
    },
  };
}

/** Bytes that a link brings. */
export async function download(page: Page, click: () => Promise<void>): Promise<Buffer> {
  const [coming] = await Promise.all([page.waitForEvent('download'), click()]);
  return readFileSync(await coming.path());
}
