import { readFileSync } from 'node:fs';
import path from 'node:path';
import { type Browser, type BrowserContext, type Page, chromium } from 'playwright-core';

const ROOT = path.resolve(__dirname, '../..');
const CHROMIUM = ['/usr/bin/chromium', '/usr/bin/chromium-browser'];
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
  const executablePath = process.env['CHROMIUM'] ?? CHROMIUM[0] ?? '';
  return chromium.launch({ executablePath, headless: true, timeout: STEP_MS, args: FLAGS });
}

/** A browser tab that keeps note of everything that must not happen. */
export interface Tab {
  readonly page: Page;
  readonly context: BrowserContext;
  /** Errors in the console, uncaught exceptions, requests to other hosts. */
  readonly faults: readonly string[];
}

export interface TabOptions {
  readonly width?: number;
  readonly height?: number;
  readonly theme?: 'light' | 'dark';
}

/** Answers that tests provoke are told in the console by the browser itself; they are no fault of the page. */
const PROVOKED = /the server responded with a status of (401|403|404|409|412|422)/;

export async function openTab(
  browser: Browser,
  baseUrl: string,
  { width = 1280, height = 860, theme = 'light' }: TabOptions = {},
): Promise<Tab> {
  const context = await browser.newContext({
    viewport: { width, height },
    colorScheme: theme,
    reducedMotion: 'reduce',
    acceptDownloads: true,
    baseURL: baseUrl,
  });
  context.setDefaultTimeout(STEP_MS);
  const page = await context.newPage();
  const faults: string[] = [];
  page.on('pageerror', (error) => faults.push(`exception: ${error.message}`));
  page.on('console', (message) => {
    if (message.type() === 'error' && !PROVOKED.test(message.text())) faults.push(`console: ${message.text()}`);
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

/** Bytes that a link brings. */
export async function download(page: Page, click: () => Promise<void>): Promise<Buffer> {
  const [coming] = await Promise.all([page.waitForEvent('download'), click()]);
  return readFileSync(await coming.path());
}
