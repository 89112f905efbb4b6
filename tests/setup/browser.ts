import { chromium, type Browser, type BrowserContext, type Page } from 'playwright-core';
import path from 'node:path';
import { afterAll, afterEach, inject } from 'vitest';
import { CHROMIUM_FLAGS, CHROMIUM_NAMES } from '../../scripts/support/chromium.mjs';
import { findProgram } from '../../scripts/support/packages.mjs';
import { closeDatabase, openDatabaseAt } from '@/lib/db/connection';
import { asOwner } from './make-database';
import { ROOT } from './vitest-shared';

let browser: Browser | undefined;
const openPages = new Set<Page>();
let isDatabaseOpen = false;

/** The address of the installation under test, without a slash at its end. */
export function serverUrl(): string {
  return inject('browserServer').url;
}

/**
 * Makes the database of the installation under test the database of this process, so that a journey can prepare
 * it through the application's own commands and look up what a page cannot show. Safe to call more than once.
 */
export function openServerDatabase(): void {
  if (isDatabaseOpen) return;
  const { database } = inject('browserServer');
  process.env.DATABASE_URL = database.url;
  openDatabaseAt(database.url, 5);
  isDatabaseOpen = true;
}

/** What a visitor's browser has complained of; a journey expects it to stay empty. */
export interface Visitor {
  readonly context: BrowserContext;
  readonly page: Page;
  /** Errors of the page's scripts, messages of its console at level error, and answers of 500 and above. */
  readonly complaints: string[];
}

async function theBrowser(): Promise<Browser> {
  if (browser?.isConnected()) return browser;
  const executablePath = CHROMIUM_NAMES.map(findProgram).find((found) => found !== null);
  if (!executablePath)
    throw new Error('chromium is missing. Install it: apt-get install chromium (as root).');
  browser = await chromium.launch({ executablePath, args: [...CHROMIUM_FLAGS], headless: true });
  return browser;
}

/**
 * Opens a window of a visitor with cookies of their own.
 * @param options.width in CSS pixels, 1440 unless told; the height follows
 * @param options.colorScheme light unless told
 */
export async function newVisitor(
  options: { width?: number; colorScheme?: 'light' | 'dark' } = {},
): Promise<Visitor> {
  const width = options.width ?? 1440;
  const context = await (
    await theBrowser()
  ).newContext({
    baseURL: serverUrl(),
    viewport: { width, height: width < 600 ? 844 : 900 },
    colorScheme: options.colorScheme ?? 'light',
    reducedMotion: 'reduce',
    locale: 'en-GB',
    timezoneId: 'UTC',
  });
  context.setDefaultTimeout(60_000);
  const page = await context.newPage();
  openPages.add(page);
  page.on('close', () => openPages.delete(page));
  const complaints: string[] = [];
  page.on('pageerror', (error) => complaints.push(`page error: ${error.message}`));
  page.on('console', (message) => {
    if (message.type() === 'error') complaints.push(`console: ${message.text()}`);
  });
  page.on('response', (response) => {
    if (response.status() >= 500) complaints.push(`${response.status()} ${response.url()}`);
  });
  return { context, page, complaints };
}

export interface CaughtMailText {
  readonly subject: string;
  readonly text: string;
  readonly html: string;
}

/**
 * Waits for a mail to an address whose subject matches, and returns the newest such mail.
 * @throws Error with the subjects that did come, after the time given
 */
export async function waitForMail(to: string, subject: RegExp, withinMs = 60_000): Promise<CaughtMailText> {
  const giveUpAt = Date.now() + withinMs;
  for (;;) {
    const mails = await asOwner(inject('browserServer').database, (owner): Promise<CaughtMailText[]> =>
      owner.query('SELECT subject, text, html FROM caught_mails WHERE envelope_to = ? ORDER BY id DESC', [
        to,
      ]),
    );
    const found = mails.find((mail) => subject.test(mail.subject));
    if (found) return found;
    if (Date.now() > giveUpAt) {
      const came = mails.map((mail) => mail.subject).join(' · ') || 'none';
      throw new Error(`No mail to ${to} with a subject like ${subject} came. Those that did: ${came}.`);
    }
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
}

/** Sets how far the installation's clock stands before the machine's (a test installation alone has such a hand). */
export async function setClockOffset(milliseconds: number): Promise<void> {
  await asOwner(inject('browserServer').database, (owner) =>
    owner.query('UPDATE installation SET clock_offset_milliseconds = ? WHERE id = 1', [milliseconds]),
  );
}

/** What the windows showed when a journey failed stands in .data/log, for whoever looks into it. */
afterEach(async ({ task }) => {
  if (task.result?.state !== 'fail') return;
  for (const [index, page] of [...openPages].entries()) {
    const file = path.join(ROOT, '.data', 'log', `failed-journey-window-${index + 1}.png`);
    await page.screenshot({ path: file, fullPage: true });
  }
});

afterAll(async () => {
  await browser?.close();
  browser = undefined;
  if (isDatabaseOpen) await closeDatabase();
  isDatabaseOpen = false;
});
