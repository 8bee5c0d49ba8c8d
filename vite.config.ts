import { readFileSync } from 'node:fs';
import preact from '@preact/preset-vite';
import type { Plugin } from 'vite';
import { VitePWA } from 'vite-plugin-pwa';
import { defineConfig } from 'vitest/config';

const { version } = JSON.parse(readFileSync(new URL('./package.json', import.meta.url), 'utf8')) as {
  version: string;
};

/** What a page of this app may do: nothing that leaves its own origin. */
export const CONTENT_SECURITY_POLICY = [
  "default-src 'self'",
  "script-src 'self' 'wasm-unsafe-eval'",
  "style-src 'self'",
  "img-src 'self' blob: data:",
  "worker-src 'self'",
  "connect-src 'self'",
  "object-src 'none'",
  "base-uri 'none'",
  "form-action 'none'",
].join('; ');

/** Writes the policy into the built page; the development server needs inline styles and stays without. */
function contentSecurityPolicy(): Plugin {
  return {
    name: 'content-security-policy',
    apply: 'build',
    transformIndexHtml: () => [
      {
        tag: 'meta',
        attrs: { 'http-equiv': 'Content-Security-Policy', content: CONTENT_SECURITY_POLICY },
        injectTo: 'head-prepend',
      },
    ],
  };
}

export default defineConfig({
  root: 'src/app',
  publicDir: '../../public',
  base: './',
  define: { __APP_VERSION__: JSON.stringify(version) },
  build: { outDir: '../../dist', emptyOutDir: true, target: 'es2022', modulePreload: { polyfill: false } },
  worker: { format: 'es' },
  preview: { headers: { 'Content-Security-Policy': CONTENT_SECURITY_POLICY } },
  plugins: [
    preact(),
    contentSecurityPolicy(),
    VitePWA({
      strategies: 'injectManifest',
      srcDir: '.',
      filename: 'serviceWorker.ts',
      injectRegister: false,
      includeManifestIcons: false,
      injectManifest: {
        globPatterns: ['**/*.{html,js,css,svg,png,jpg,json,webmanifest}'],
        globIgnores: ['screenshots/**'],
        maximumFileSizeToCacheInBytes: 4_000_000,
      },
      manifest: {
        id: 'tintfathom',
        name: 'Tintfathom: film thickness from a photo',
        short_name: 'Tintfathom',
        description: 'Reads the thickness of a thin liquid film from the colours in a photo, offline.',
        start_url: './',
        scope: './',
        display: 'standalone',
        orientation: 'any',
        background_color: '#10191b',
        theme_color: '#10191b',
        categories: ['utilities', 'education'],
        icons: [
          { src: 'icons/icon-192.png', sizes: '192x192', type: 'image/png' },
          { src: 'icons/icon-512.png', sizes: '512x512', type: 'image/png' },
          { src: 'icons/icon-maskable-512.png', sizes: '512x512', type: 'image/png', purpose: 'maskable' },
        ],
        screenshots: [
          {
            src: 'screenshots/reading.png',
            sizes: '780x1688',
            type: 'image/png',
            form_factor: 'narrow',
            label: 'A reading with its interval',
          },
          {
            src: 'screenshots/wide.png',
            sizes: '1280x800',
            type: 'image/png',
            form_factor: 'wide',
            label: 'The map on a desktop',
          },
        ],
        shortcuts: [{ name: 'Colour chart', url: './#/chart' }],
      },
    }),
  ],
  test: {
    root: '.',
    include: ['tests/**/*.test.{ts,tsx}'],
    benchmark: { include: ['tests/**/*.bench.ts'] },
    testTimeout: 60_000,
    fileParallelism: true,
    maxWorkers: 2,
  },
});
