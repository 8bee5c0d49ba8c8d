import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import type { Page } from 'playwright-core';
import type { Setup } from '../../src/engine/setup.ts';

const axeSource = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');

/** Violations that axe-core finds on the page, as "rule: first element". */
export async function violations(page: Page): Promise<string[]> {
  await page.evaluate(axeSource);
  return page.evaluate(async () => {
    const { axe } = globalThis as unknown as {
      axe: {
        run: (target: Document) => Promise<{ violations: { id: string; nodes: { html: string }[] }[] }>;
      };
    };
    const { violations: found } = await axe.run(document);
    return found.map((violation) => `${violation.id}: ${violation.nodes[0]?.html}`);
  });
}

/** Controls that are shown with less than `leastPx` either way, in words. */
export function smallControls(page: Page, leastPx = 48): Promise<string[]> {
  return page.evaluate(
    (least) =>
      [...document.querySelectorAll('button, select, input:not(.hidden-input), a.button, [role="slider"]')]
        .map((element) => ({ element, box: element.getBoundingClientRect() }))
        // A tick box is pressed by its whole line.
        .filter(({ element, box }) => box.width > 0 && !element.closest('.check'))
        .filter(({ box }) => box.width < least - 0.5 || box.height < least - 0.5)
        .map(({ element, box }) => `${element.outerHTML.slice(0, 80)} ${box.width} x ${box.height}`),
    leastPx,
  );
}

/** Text and controls that stick out of the sheet sideways, or lie over each other in it. */
export function misplaced(page: Page): Promise<string[]> {
  return page.evaluate(() => {
    const sheet = document.querySelector('.content')?.getBoundingClientRect();
    if (!sheet) return ['no sheet'];
    const found: string[] = [];
    const leaves = [...document.querySelectorAll('.content *')].filter((element) =>
      [...element.childNodes].some((node) => node.nodeType === 3 && node.textContent?.trim()),
    );
    const boxes = leaves
      .filter((element) => element.tagName !== 'OPTION')
      .map((element) => {
        const range = document.createRange();
        range.selectNodeContents(element);
        return { element, box: range.getBoundingClientRect() };
      })
      .filter(({ element, box }) => box.width > 0 && element.checkVisibility());
    for (const { element, box } of boxes) {
      if (box.left < sheet.left - 1 || box.right > sheet.right + 1)
        found.push(`sticks out: ${element.textContent?.slice(0, 40)}`);
    }
    const shown = [...document.querySelectorAll('.content button, .content input, .content select')].filter(
      (element) => element.checkVisibility(),
    );
    for (const control of shown) {
      const own = control.getBoundingClientRect();
      for (const { element, box } of boxes) {
        const over =
          Math.min(own.right, box.right) - Math.max(own.left, box.left) > 2 &&
          Math.min(own.bottom, box.bottom) - Math.max(own.top, box.top) > 2;
        if (over && own.width > 0 && !control.contains(element) && !element.contains(control))
          found.push(
            `${control.textContent || control.getAttribute('aria-label')} over ${element.textContent}`,
          );
      }
    }
    return found;
  });
}

/** The button of a step in the bar below. */
export const stepButton = (page: Page, name: string) =>
  page.getByRole('navigation', { name: 'Steps' }).getByRole('button', { name, exact: true });

/** The set-up that the app keeps for a reload. */
export function keptSetup(page: Page): Promise<Setup> {
  return page.evaluate(() => {
    const text = localStorage.getItem('tintfathom.setup') ?? '{"setup":{}}';
    return (JSON.parse(text) as { setup: Setup }).setup;
  });
}

/** Place on the screen of a pixel of a photo that is shown whole, centred on the stage. */
export async function onScreen(
  page: Page,
  photo: { readonly width: number; readonly height: number },
  x: number,
  y: number,
): Promise<readonly [number, number]> {
  const box = await page.locator('.stage > canvas').boundingBox();
  if (!box) throw new Error('There is no stage.');
  const scale = Math.min(box.width / photo.width, box.height / photo.height);
  return [
    box.x + (box.width - photo.width * scale) / 2 + x * scale,
    box.y + (box.height - photo.height * scale) / 2 + y * scale,
  ];
}
