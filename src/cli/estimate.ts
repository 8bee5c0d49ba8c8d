/** `npm run --silent estimate`: the whole job headless. */
import { mkdir, readFile, rm, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { estimate } from '../engine/estimate.ts';
import { parseSetup } from '../engine/parseSetup.ts';
import { photoViewOf, withPhotoFocal } from '../engine/photoView.ts';
import { SetupError } from '../engine/prepareScene.ts';
import type { Setup } from '../engine/setup.ts';
import { tallyPhoto } from '../engine/tally.ts';
import type { DecodedPhoto } from '../photo/types.ts';
import { placeless } from '../record/redact.ts';
import { parseEstimateArguments, USAGE, UsageError } from './arguments.ts';
import { decodePhotoFile } from './decodePhoto.ts';
import { resultFiles } from './resultFiles.ts';
import { runCommand } from './runCommand.ts';
import { GROUND_FILES, tallyFiles } from './tallyFiles.ts';

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
  const given = await readSetup(options.setup);
  const opened = await decodePhotoFile(options.photo);
  // From here on the place is not known, so nothing that is worked out can give it away.
  const photo: DecodedPhoto = options.noPosition
    ? { ...opened, metadata: placeless(opened.metadata) }
    : opened;
  const setup = withPhotoFocal(options.noPosition ? placeless(given) : given, photo.metadata);
  const decoded = performance.now();
  const { pixels, metadata } = photo;
  const view = photoViewOf(setup, pixels.width, pixels.height);
  const result = estimate(pixels, setup, () => performance.now());
  const report = tallyPhoto(result.map, setup, view, {}, { ...result.tallyFacts, metadata });
  try {
    await mkdir(options.out, { recursive: true });
    // Files of an earlier run must not pass for this one's.
    for (const name of [...GROUND_FILES, 'camera.json']) await rm(join(options.out, name), { force: true });
  } catch {
    throw new UsageError(`The folder ${options.out} cannot be made; name another with --out.`);
  }
  const timingsMs = { decode: decoded - started };
  for (const [name, bytes] of resultFiles(photo, setup, result, timingsMs, new Date().toISOString())) {
    await writeFile(join(options.out, name), bytes);
  }
  for (const [name, bytes] of tallyFiles(result.map, setup, metadata, report)) {
    await writeFile(join(options.out, name), bytes);
  }
  if (result.camera) {
    console.log(
      `camera.json keeps this camera (fitted ${result.camera.determined}): give it as camera.kept for the next photo of the same phone.`,
    );
  }
  return 0;
}

await runCommand(main);
