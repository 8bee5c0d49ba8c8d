/** A page of a real browser with the chart screen in it, served by Vite on a port of its own. */
import { dirname, join } from 'node:path';
import preact from '@preact/preset-vite';
import type { Browser, Page } from 'playwright-core';
import { createServer } from 'vite';
import type { Setup } from '../../src/engine/setup.ts';
import { launchChromium } from '../browser/chromium.ts';

export interface ChartPage {
  readonly page: Page;
  readonly show: (setup: Setup, failWith?: string) => Promise<void>;
  readonly close: () => Promise<void>;
}

export async function openChartPage(): Promise<ChartPage> {
  const project = dirname(dirname(import.meta.dirname));
  const server = await createServer({
    configFile: false,
    root: project,
    logLevel: 'error',
    plugins: [preact()],
    define: { __APP_VERSION__: JSON.stringify('0.0.0-test') },
    cacheDir: join(project, 'node_modules/.vite-chart-tests'),
    server: { port: 0, host: '127.0.0.1', watch: null, hmr: false },
    // Named, or Vite finds them in mid-test and reloads the page.
    optimizeDeps: {
      include: [
        'preact',
        'preact/hooks',
        'preact/jsx-runtime',
        'preact/jsx-dev-runtime',
        '@preact/signals',
        'idb',
      ],
      noDiscovery: true,
    },
    appType: 'custom',
  });
  server.middlewares.use('/blank', (_request, response) => {
    response.setHeader('content-type', 'text/html');
    response.end(
      '<!doctype html><html lang="en"><meta name="viewport" content="width=device-width"><title>chart</title><script type="module" src="/tests/app/chartInPage.tsx"></script>',
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
    const page = await browser.newPage({ viewport: { width: 390, height: 844 }, deviceScaleFactor: 2 });
    await page.goto(`http://127.0.0.1:${address.port}/blank`);
    await page.waitForFunction(() => 'chartTests' in globalThis);
    const show = async (setup: Setup, failWith = '') => {
      await page.evaluate(
        ([what, failure]) => {
          chartTests.failWith = failure;
          chartTests.asked = [];
          chartTests.show(what);
        },
        [setup, failWith] as const,
      );
    };
    return { page, show, close };
  } catch (error) {
    await close();
    throw error;
  }
}
