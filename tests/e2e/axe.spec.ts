import { AxeBuilder } from '@axe-core/playwright';
import type { Page } from 'playwright-core';
import { beforeAll, describe, expect, it } from 'vitest';
import { pageRoutes } from '#client/app/routes.tsx';
import { signIn, signUp } from './helpers/accounts.ts';
import { useBrowser } from './helpers/browser.ts';
import { keepPicture, narrow, wide } from './helpers/pictures.ts';
import { soon } from './helpers/soon.ts';
import { places, type Place, type Reader } from './helpers/places.ts';

const tags = ['wcag2a', 'wcag2aa', 'wcag21aa', 'wcag22aa'];
const colourRules = ['color-contrast', 'link-in-text-block'];

const people = useBrowser();
const pages = new Map<Reader, Page>();

/** One browser profile for each reader, signed in once. */
async function pageOf(reader: Reader): Promise<Page> {
  const known = pages.get(reader);
  if (known) return known;
  const page = await people.newVisitor({ reducedMotion: 'reduce' });
  if (reader === 'newcomer') {
    await signUp(page, {
      email: `nell.${Date.now().toString(36)}@bench.example`,
      password: 'the first day here',
      name: 'Nell Harker',
      region: 'Low Tannery',
    });
  } else if (reader !== 'nobody') await signIn(page, reader);
  pages.set(reader, page);
  return page;
}

async function settle(page: Page): Promise<void> {
  await page.getByRole('heading', { level: 1 }).first().waitFor();
  await page.waitForLoadState('networkidle');
}

async function faultsOf(page: Page, colorScheme: 'light' | 'dark'): Promise<string[]> {
  // The PDF viewer in the frame is the browser's own.
  const axe = new AxeBuilder({ page }).exclude('iframe').setLegacyMode(true);
  // Light and dark are the same page in other colours: what is no matter of colour has been looked at in the light.
  const { violations } = await (
    colorScheme === 'light' ? axe.withTags(tags) : axe.withRules(colourRules)
  ).analyze();
  return violations.flatMap(({ id, nodes }) =>
    nodes.map((node) => `${id}: ${node.target.join(' ')} ${node.failureSummary ?? ''}`),
  );
}

/** What makes the page wider than its window; what scrolls or is cut off in a box of its own does not count. */
function overflow(page: Page): Promise<string[]> {
  return page.evaluate(() => {
    const { scrollWidth, clientWidth } = document.documentElement;
    if (scrollWidth <= clientWidth) return [];
    const wide = [...document.querySelectorAll('body *')].filter(
      (element) => element.getBoundingClientRect().right > clientWidth + 0.5,
    );
    return [
      `${scrollWidth} px`,
      ...wide.map((element) => `${element.tagName} ${element.textContent.slice(0, 60)}`),
    ];
  });
}

async function lookAt({ name, reader, address, act }: Place): Promise<void> {
  const page = await pageOf(reader);
  await page.setViewportSize(wide);
  await page.goto(typeof address === 'string' ? address : await address());
  await settle(page);
  await act?.(page);
  for (const size of [wide, narrow]) {
    await page.setViewportSize(size);
    for (const colorScheme of ['light', 'dark'] as const) {
      await page.emulateMedia({ colorScheme });
      expect(await faultsOf(page, colorScheme), `${name}, ${size.width} px, ${colorScheme}`).toEqual([]);
    }
  }
  await page.setViewportSize({ width: 320, height: 640 });
  // Drawings follow their box a moment later.
  await soon(() => overflow(page), 3_000).toEqual([]);
  await keepPicture(page, `axe ${name}`);
}

describe('every page', () => {
  beforeAll(async () => {
    for (const reader of new Set(places.map((place) => place.reader))) await pageOf(reader);
  });

  it('of the client has a place here', () => {
    const shown = new Set(places.map(({ route }) => route));
    const missing = pageRoutes.map(({ path }) => path ?? '').filter((path) => !shown.has(path));
    expect(missing).toEqual([]);
  });

  it.each(places)('$name: axe finds nothing, light and dark, wide and narrow', (place) => lookAt(place));
});
