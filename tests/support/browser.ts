import AxeBuilder from '@axe-core/playwright';
import { type Browser, type BrowserContext, chromium, type Page } from 'playwright-core';

const chromiumArguments = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
  '--disable-dev-shm-usage',
];

/** Debian's Chromium; the test script installs it. */
export function launchBrowser(): Promise<Browser> {
  return chromium.launch({ executablePath: '/usr/bin/chromium', args: chromiumArguments });
}

/** One person at one browser, with everything the page complained about. */
export type Visitor = {
  readonly page: Page;
  readonly context: BrowserContext;
  /** Errors and warnings of the console, uncaught errors; must stay empty. */
  readonly complaints: readonly string[];
  readonly leave: () => Promise<void>;
};

export async function visit(
  browser: Browser,
  address: string,
  { width = 1440, height = 900, theme = 'light' as 'light' | 'dark' } = {},
): Promise<Visitor> {
  const context = await browser.newContext({ viewport: { width, height }, colorScheme: theme, baseURL: address });
  const page = await context.newPage();
  page.setDefaultTimeout(30_000);
  const complaints: string[] = [];
  page.on('console', (message) => {
    // Chromium itself reports each refused request; what the app makes of it is what counts.
    if (message.text().startsWith('Failed to load resource')) return;
    if (message.type() === 'error' || message.type() === 'warning') complaints.push(message.text());
  });
  page.on('pageerror', (error) => complaints.push(error.message));
  return { page, context, complaints, leave: () => context.close() };
}

export async function signIn(visitor: Visitor, email: string, password: string): Promise<void> {
  const { page } = visitor;
  await page.getByLabel('Mail address').fill(email);
  await page.getByLabel('Password').fill(password);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.getByRole('button', { name: 'Sign out' }).waitFor();
}

const standards = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'];

/** What axe finds against WCAG 2.2 AA on the page as it stands, one line for each element. */
export async function accessibilityFaults(page: Page): Promise<string[]> {
  const { violations } = await new AxeBuilder({ page }).withTags(standards).analyze();
  return violations.flatMap((violation) =>
    violation.nodes.map(
      (node) => `${violation.id}: ${node.target.join(' ')} (${node.failureSummary ?? violation.help})`,
    ),
  );
}

/** How far the page is wider than its window, in pixels. */
export function sidewaysScroll(page: Page): Promise<number> {
  return page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth);
}
