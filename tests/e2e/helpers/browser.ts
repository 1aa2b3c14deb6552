import type { Browser, BrowserContextOptions, Page } from 'playwright-core';
import { afterAll, afterEach, beforeAll, expect, inject } from 'vitest';
import { launchBrowser } from './launch-browser.ts';
import { keepFailure, wide } from './pictures.ts';

/** What a page said that it should not have: uncaught errors, and errors of the console that are no refusal of the API. */
const complaints: string[] = [];

function listen(page: Page): void {
  page.on('pageerror', (error) => complaints.push(`${page.url()}: ${error.message}`));
  page.on('console', (message) => {
    // Chromium reports each answer of 400 and above as an error of its own; refusals are part of the tests.
    if (message.type() === 'error' && !message.text().startsWith('Failed to load resource')) {
      complaints.push(`${page.url()}: ${message.text()}`);
    }
  });
}

/** One browser for a file, and people in it who share nothing with each other. */
export function useBrowser() {
  let browser: Browser;
  beforeAll(async () => {
    browser = await launchBrowser();
  });
  afterEach(async ({ task }) => {
    if (task.result?.state !== 'fail') return;
    const pages = browser.contexts().flatMap((context) => context.pages());
    for (const [index, page] of pages.entries()) await keepFailure(page, `${task.name} ${index + 1}`);
  });
  afterAll(async () => {
    await browser.close();
    expect(complaints, 'what the pages complained about').toEqual([]);
  });
  return {
    async newVisitor(options: BrowserContextOptions = {}): Promise<Page> {
      const context = await browser.newContext({
        baseURL: inject('baseUrl'),
        viewport: wide,
        locale: 'en-US',
        timezoneId: 'Europe/Lisbon',
        ...options,
      });
      context.setDefaultTimeout(20_000);
      context.on('page', listen);
      return context.newPage();
    },
  };
}
