/** A page of a real browser with the photo modules in it. */
import type { Page } from 'playwright-core';
import { openServedPage } from '../browser/servedPage.ts';
import type { Answer } from './inPage.ts';

export interface PhotoPage {
  readonly page: Page;
  readonly close: () => Promise<void>;
}

export function openPhotoPage(): Promise<PhotoPage> {
  return openServedPage({
    module: '/tests/photo/inPage.ts',
    ready: 'photoTests',
    packages: ['fflate', 'fast-png', 'exifr/dist/mini.esm.mjs'],
  });
}

/** Opens a file by `decodePhoto` in the page, or in a worker of it. */
export async function decodeInPage(
  page: Page,
  file: Uint8Array,
  options: { maxPixels?: number; abortAt?: number; worker?: boolean } = {},
): Promise<{ answer: Answer; codes: Uint8Array }> {
  const { worker = false, ...rest } = options;
  const order = { base64: Buffer.from(file).toString('base64'), ...rest };
  const answer = await page.evaluate(
    ([task, inWorker]) => (inWorker ? photoTests.decodeInWorker(task) : photoTests.decode(task)),
    [order, worker] as const,
  );
  return { answer, codes: answer.error ? new Uint8Array() : Buffer.from(answer.base64, 'base64') };
}
