import type { Page, Response } from 'playwright-core';

/**
 * Opens a page and waits until its scripts have come to rest: a journey types faster than a person, and what is typed
 * before the page listens could be lost.
 */
export function visit(page: Page, path: string): Promise<Response | null> {
  return page.goto(path, { waitUntil: 'networkidle' });
}
