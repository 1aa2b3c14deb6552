/**
 * Makes `client/public/picture.png`, the picture of the README: the register and a lot, 1280 pixels wide, in the light.
 * Starts the whole product with its demo in a throw-away folder; with an address as argument it takes what runs there.
 */
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import type { Page } from 'playwright-core';
import sharp from 'sharp';
import { startProduct } from '../setup/start-product.ts';
import { makeThrowAwayFolder } from '../setup/throw-away-folder.ts';
import { launchBrowser } from './helpers/launch-browser.ts';

const target = fileURLToPath(new URL('../../client/public/picture.png', import.meta.url));
const width = 1280;
const registerHeight = 720;
const lotHeight = 880;
const gap = 2;

async function shoot(page: Page, height: number): Promise<Buffer> {
  await page.waitForLoadState('networkidle');
  return page.screenshot({ clip: { x: 0, y: 0, width, height } });
}

async function drawPicture(baseUrl: string): Promise<void> {
  const browser = await launchBrowser();
  try {
    const page = await browser.newPage({
      baseURL: baseUrl,
      viewport: { width, height: lotHeight },
      colorScheme: 'light',
      reducedMotion: 'reduce',
      locale: 'en-US',
      timezoneId: 'UTC',
    });
    await page.goto('/lots');
    await page.getByRole('table').waitFor();
    const register = await shoot(page, registerHeight);
    await page.getByRole('link', { name: 'Gold and silver button, unparted' }).click();
    await page.getByRole('region', { name: 'Price and purchase' }).waitFor();
    const lot = await shoot(page, lotHeight);
    await sharp({
      create: { width, height: registerHeight + gap + lotHeight, channels: 3, background: '#1C2427' },
    })
      .composite([
        { input: register, left: 0, top: 0 },
        { input: lot, left: 0, top: registerHeight + gap },
      ])
      .png({ palette: true, colours: 128, compressionLevel: 9 })
      .toFile(target);
    process.stdout.write(`${path.relative(process.cwd(), target)}\n`);
  } finally {
    await browser.close();
  }
}

const running = process.argv[2];
if (running !== undefined) await drawPicture(running);
else {
  const { folder, remove } = await makeThrowAwayFolder();
  try {
    const product = await startProduct({ dataFolder: path.join(folder, 'data') });
    try {
      await drawPicture(product.ready.urls.product);
    } finally {
      await product.stop();
    }
  } finally {
    remove();
  }
}
