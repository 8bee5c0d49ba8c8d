/** The real browser of the browser tests: found, or installed where we may, or a sentence that says how to get one. */
import { execFileSync } from 'node:child_process';
import { existsSync } from 'node:fs';
import { type Browser, chromium, type LaunchOptions } from 'playwright-core';

const PLACES = [
  '/usr/bin/chromium',
  '/usr/bin/chromium-browser',
  '/usr/bin/google-chrome',
  '/usr/bin/google-chrome-stable',
];

const found = (): string | undefined =>
  [process.env.CHROMIUM_PATH ?? '', ...PLACES].find((path) => path !== '' && existsSync(path));

/**
 * Path of a Chromium: the environment's CHROMIUM_PATH, else the usual places, else (as root on Debian) freshly installed.
 * @throws Error that says how to install one
 */
export function chromiumPath(): string {
  const path = found();
  if (path) return path;
  if (process.getuid?.() === 0) {
    try {
      execFileSync('apt-get', ['install', '-y', '-qq', '--no-install-recommends', 'chromium'], {
        env: { ...process.env, DEBIAN_FRONTEND: 'noninteractive' },
        stdio: 'ignore',
      });
    } catch {
      // The sentence below says what to do.
    }
    const installed = found();
    if (installed) return installed;
  }
  throw new Error(
    'The browser tests need Chromium. Install it (Debian: sudo apt-get install chromium), or set CHROMIUM_PATH to one.',
  );
}

/** A headless browser that talks to nothing but the page under test. Close it. */
export function launchChromium(options: LaunchOptions = {}): Promise<Browser> {
  return chromium.launch({
    executablePath: chromiumPath(),
    headless: true,
    ...options,
    args: [
      '--no-sandbox',
      '--disable-gpu',
      '--disable-quic',
      '--no-first-run',
      '--disable-background-networking',
      '--disable-component-update',
      '--disable-sync',
      ...(options.args ?? []),
    ],
  });
}
