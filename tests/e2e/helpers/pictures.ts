import { mkdirSync } from 'node:fs';
import path from 'node:path';
import type { Page } from 'playwright-core';

export const wide = { width: 1280, height: 900 } as const;
export const narrow = { width: 360, height: 740 } as const;

const folder = process.env.E2E_PICTURES;

/** With E2E_PICTURES=<folder> every stage is kept as a picture, wide and narrow, to be looked at by people. */
export async function keepPicture(page: Page, name: string): Promise<void> {
  if (!folder) return;
  mkdirSync(folder, { recursive: true });
  for (const size of [narrow, wide]) {
    await page.setViewportSize(size);
    await page.waitForTimeout(150);
    await page.screenshot({ path: path.join(folder, `${name}-${size.width}.png`), fullPage: true });
  }
}

/** What a page showed when its test failed. */
export async function keepFailure(page: Page, name: string): Promise<void> {
  if (!folder) return;
  mkdirSync(folder, { recursive: true });
  const file = `failed ${name}`.replaceAll(/[^\w -]/g, '');
  await page.screenshot({ path: path.join(folder, `${file}.png`), fullPage: true });
}
