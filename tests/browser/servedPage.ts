/** A page of a real browser with one of our modules in it, served by Vite on a port of its own. */
import { dirname, join } from 'node:path';
import type { Browser, BrowserContextOptions, Page } from 'playwright-core';
import { createServer } from 'vite';
import { launchChromium } from './chromium.ts';

export interface ServedPage {
  readonly page: Page;
  readonly browser: Browser;
  readonly origin: string;
  readonly close: () => Promise<void>;
}

export interface ServedPageOptions {
  /** From the project's root: "/tests/record/inPage.ts". */
  readonly module: string;
  /** Global that the module sets when it is ready. */
  readonly ready: string;
  /** Packages that the module uses; named, or Vite finds them in mid-test and reloads the page. */
  readonly packages: readonly string[];
  /** What is in the page before the module runs. */
  readonly body?: string;
  readonly context?: BrowserContextOptions;
  /** Sent with the page as its Content-Security-Policy. */
  readonly policy?: string;
}

export async function openServedPage({
  module,
  ready,
  packages,
  body = '<div id="app"></div>',
  context,
  policy,
}: ServedPageOptions): Promise<ServedPage> {
  const project = dirname(dirname(import.meta.dirname));
  const server = await createServer({
    configFile: false,
    root: project,
    logLevel: 'error',
    define: { __APP_VERSION__: JSON.stringify('0.0.0-test') },
    cacheDir: join(project, `node_modules/.vite-${ready}`),
    server: { port: 0, host: '127.0.0.1', watch: null, hmr: false },
    optimizeDeps: { include: [...packages], noDiscovery: true },
    oxc: { jsx: { runtime: 'automatic', importSource: 'preact' } },
    appType: 'custom',
  });
  server.middlewares.use('/blank', (_request, response) => {
    response.setHeader('content-type', 'text/html');
    if (policy) response.setHeader('content-security-policy', policy);
    response.end(
      `<!doctype html><html lang="en"><meta name="viewport" content="width=device-width"><title>Test</title>${body}<script type="module" src="${module}"></script></html>`,
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
    const origin = `http://127.0.0.1:${address.port}`;
    const page = await (await browser.newContext(context)).newPage();
    await page.goto(`${origin}/blank`);
    await page.waitForFunction((name) => name in globalThis, ready);
    return { page, browser, origin, close };
  } catch (error) {
    await close();
    throw error;
  }
}
