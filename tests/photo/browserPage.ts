/** A page of a real browser with the photo modules in it, served by Vite on a port of its own. */
import { dirname, join } from 'node:path';
import type { Browser, Page } from 'playwright-core';
import { createServer } from 'vite';
import { launchChromium } from '../browser/chromium.ts';
import type { Answer } from './inPage.ts';

export interface PhotoPage {
  readonly page: Page;
  readonly close: () => Promise<void>;
}

export async function openPhotoPage(): Promise<PhotoPage> {
  const project = dirname(dirname(import.meta.dirname));
  const server = await createServer({
    configFile: false,
    root: project,
    logLevel: 'error',
    cacheDir: join(project, 'node_modules/.vite-photo-tests'),
    server: { port: 0, host: '127.0.0.1', watch: null, hmr: false },
    // Named, or Vite finds them in mid-test and reloads the page.
    optimizeDeps: { include: ['fflate', 'fast-png', 'exifr/dist/mini.esm.mjs'], noDiscovery: true },
    appType: 'custom',
  });
  server.middlewares.use('/blank', (_request, response) => {
    response.setHeader('content-type', 'text/html');
    response.end(
      '<!doctype html><title>photo</title><script type="module" src="/tests/photo/inPage.ts"></script>',
    );
  });
  await server.listen();
  const address = server.httpServer?.address();
  if (!address || typeof address === 'string') throw new Error('The test server has no port.');
  let browser: Browser | undefined;
  const close = async () => {
    await browser?.close();
    await server.close();
  };
  try {
    browser = await launchChromium();
    const page = await browser.newPage();
    await page.goto(`http://127.0.0.1:${address.port}/blank`);
    await page.waitForFunction(() => 'photoTests' in globalThis);
    return { page, close };
  } catch (error) {
    await close();
    throw error;
  }
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
