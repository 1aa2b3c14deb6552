import type { Locator, Page } from 'playwright-core';
import { expect } from 'vitest';

type Stop = { name: string; isVisible: boolean; isInView: boolean };

/** What has the focus now, and whether an eye finds it: an outline or a ring of its own, or of the label around it. */
function lookAtFocus(): Stop {
  const element = document.activeElement;
  if (!element || element === document.body) return { name: 'the page', isVisible: true, isInView: true };
  const hasOutline = (one: Element) => {
    const style = getComputedStyle(one);
    return style.outlineStyle !== 'none' && Number.parseFloat(style.outlineWidth) >= 2;
  };
  const around = element.closest('label');
  const { top, bottom, left, right } = element.getBoundingClientRect();
  const words = element.getAttribute('aria-label') ?? element.textContent?.trim().slice(0, 60);
  return {
    name: `${element.tagName.toLowerCase()}#${element.id} ${words ?? ''}`,
    isVisible: hasOutline(element) || (around !== null && hasOutline(around)),
    isInView: bottom > 0 && right > 0 && top < innerHeight && left < innerWidth,
  };
}

/** Presses Tab until the control has the focus. Each stop on the way must be seen, and none may hold the focus back. */
export async function tabTo(page: Page, target: Locator, stopsMax = 60): Promise<void> {
  const stops: string[] = [];
  for (let stop = 0; stop < stopsMax; stop += 1) {
    await page.keyboard.press('Tab');
    const seen = await page.evaluate(lookAtFocus);
    expect(seen, `the focus at stop ${stop + 1} of ${page.url()}`).toMatchObject({
      isVisible: true,
      isInView: true,
    });
    stops.push(seen.name);
    if (await target.evaluate((element) => element === document.activeElement)) return;
  }
  throw new Error(`Tab did not reach the control; it stopped at\n${stops.join('\n')}`);
}

/** Goes to a control with Tab and types into it. */
export async function typeInto(page: Page, target: Locator, text: string): Promise<void> {
  await tabTo(page, target);
  await page.keyboard.type(text);
}
