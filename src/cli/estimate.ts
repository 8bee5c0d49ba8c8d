/** `npm run --silent estimate`: the whole job headless. */
import { mkdir, readFile, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { estimate } from '../engine/estimate.ts';
import { parseSetup } from '../engine/parseSetup.ts';
import { withPhotoFocal } from '../engine/photoView.ts';
import { SetupError } from '../engine/prepareScene.ts';
import type { Setup } from '../engine/setup.ts';
import { PhotoError } from '../photo/types.ts';
import { parseEstimateArguments, USAGE, UsageError } from './arguments.ts';
import { decodePhotoFile } from './decodePhoto.ts';
import { resultFiles } from './resultFiles.ts';

const BAD_INPUT = 2;

async function readSetup(path: string): Promise<Setup> {
  let text: string;
  try {
    text = await readFile(path, 'utf8');
  } catch {
    throw new SetupError(`The set-up file ${path} cannot be read; check its name.`);
  }
  let value: unknown;
  try {
    value = JSON.parse(text);
  } catch (error) {
    throw new SetupError(
      `The set-up file ${path} is not JSON: ${error instanceof Error ? error.message : error}.`,
    );
  }
  return parseSetup(value);
}

async function main(): Promise<number> {
  const options = parseEstimateArguments(process.argv.slice(2));
  if (options === 'help') {
    console.log(USAGE);
    return 0;
  }
  const started = performance.now();
  const stated = await readSetup(options.setup);
  const photo = await decodePhotoFile(options.photo);
  const setup = withPhotoFocal(stated, photo.metadata);
  const decoded = performance.now();
  const result = estimate(photo.pixels, setup, () => performance.now());
  try {
    await mkdir(options.out, { recursive: true });
  } catch {
    throw new UsageError(`The folder ${options.out} cannot be made; name another with --out.`);
  }
  for (const [name, bytes] of resultFiles(photo, setup, result, { decode: decoded - started })) {
    await writeFile(join(options.out, name), bytes);
  }
  return 0;
}

try {
  process.exitCode = await main();
} catch (error) {
  const known = error instanceof UsageError || error instanceof SetupError || error instanceof PhotoError;
  if (!known) throw error;
  console.error(error.message.replaceAll('\n', ' '));
  process.exitCode = BAD_INPUT;
}
