/** Programs of others that read what we write. A missing one is an error that says how to get it, never a skipped test. */
import { type SpawnSyncReturns, spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

/** Debian packages of the programs used. */
const PACKAGES: Readonly<Record<string, string>> = {
  gdalinfo: 'gdal-bin',
  gdal_translate: 'gdal-bin',
  ogr2ogr: 'gdal-bin',
  gdallocationinfo: 'gdal-bin',
  ogrinfo: 'gdal-bin',
  tiffinfo: 'libtiff-tools',
  tiffdump: 'libtiff-tools',
  tiffcp: 'libtiff-tools',
  pdftotext: 'poppler-utils',
  pdfinfo: 'poppler-utils',
  soffice: 'libreoffice-calc',
  python3: 'python3',
  unzip: 'unzip',
  exiftool: 'libimage-exiftool-perl',
};

function run(
  command: string,
  args: readonly string[],
  input?: string,
  env?: NodeJS.ProcessEnv,
): SpawnSyncReturns<string> {
  const result = spawnSync(command, [...args], { encoding: 'utf8', input, env, maxBuffer: 1 << 28 });
  if (result.error) {
    const missing = (result.error as NodeJS.ErrnoException).code === 'ENOENT';
    const how = `sudo apt-get install --no-install-recommends ${PACKAGES[command] ?? command}`;
    throw missing
      ? new Error(`This check needs ${command}. Install it (Debian: ${how}).`)
      : new Error(`${command} could not run: ${result.error.message}`);
  }
  return result;
}

/** What the program says on its standard output; its complaint is the error where it ends with one. */
export function tool(
  command: string,
  args: readonly string[],
  options: { readonly input?: string; readonly env?: NodeJS.ProcessEnv } = {},
): string {
  const result = run(command, args, options.input, options.env);
  if (result.status !== 0) throw new Error(`${command} ended with ${result.status}: ${result.stderr}`);
  return result.stdout;
}

/** The same with what it says on its standard error, where warnings are the point. */
export function toolWithWarnings(command: string, args: readonly string[]): string {
  const result = run(command, args);
  if (result.status !== 0) throw new Error(`${command} ended with ${result.status}: ${result.stderr}`);
  return result.stdout + result.stderr;
}

/** A directory that goes away with `remove`. */
export function scratch(): {
  readonly path: (name: string) => string;
  readonly write: (name: string, content: Uint8Array | string) => string;
  readonly read: (name: string) => Buffer;
  readonly remove: () => void;
} {
  const directory = mkdtempSync(join(tmpdir(), 'record-'));
  const path = (name: string) => join(directory, name);
  return {
    path,
    write: (name, content) => {
      writeFileSync(path(name), content);
      return path(name);
    },
    read: (name) => readFileSync(path(name)),
    remove: () => rmSync(directory, { recursive: true, force: true }),
  };
}
