/** A page of a real browser with the chart screen in it. */
import type { Page } from 'playwright-core';
import type { Setup } from '../../src/engine/setup.ts';
import { openServedPage } from '../browser/servedPage.ts';

export interface ChartPage {
  readonly page: Page;
  readonly show: (setup: Setup, failWith?: string) => Promise<void>;
  readonly close: () => Promise<void>;
}

export async function openChartPage(): Promise<ChartPage> {
  const { page, close } = await openServedPage({
    module: '/tests/app/chartInPage.tsx',
    ready: 'chartTests',
    packages: [
      'preact',
      'preact/hooks',
      'preact/jsx-runtime',
      'preact/jsx-dev-runtime',
      '@preact/signals',
      'idb',
    ],
    body: '',
    context: { viewport: { width: 390, height: 844 }, deviceScaleFactor: 2 },
  });
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
}
