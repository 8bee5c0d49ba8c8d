import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { preview } from 'vite';

/** The app as a person installs it: built and served on a free port of this machine. */
export interface BuiltApp {
  readonly url: string;
  readonly outDir: string;
  readonly close: () => Promise<void>;
}

/** Builds in a process of its own: inside the test runner the build would not be one for production. */
export async function serveBuiltApp(): Promise<BuiltApp> {
  const outDir = mkdtempSync(join(tmpdir(), 'tintfathom-app-'));
  execFileSync(
    process.execPath,
    ['node_modules/vite/bin/vite.js', 'build', '--outDir', outDir, '--logLevel', 'error'],
    {
      env: { ...process.env, NODE_ENV: 'production' },
      stdio: 'pipe',
    },
  );
  const server = await preview({
    logLevel: 'error',
    build: { outDir },
    preview: { host: '127.0.0.1', port: 0 },
  });
  const url = server.resolvedUrls?.local[0];
  if (!url) throw new Error('The preview server gave no address.');
  return {
    url,
    outDir,
    close: async () => {
      await server.close();
      rmSync(outDir, { recursive: true, force: true });
    },
  };
}
