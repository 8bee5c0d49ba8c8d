/** `npm run --silent camera`: fits the camera to a photo of the 24-patch colour target, headless. */
import { writeFile } from 'node:fs/promises';
import { parseArgs } from 'node:util';
import { ILLUMINANT_IDS } from '../colour/light.ts';
import { cameraNameFrom, nameCamera } from '../engine/keptCamera.ts';
import { measureTarget } from '../engine/measureTarget.ts';
import { parseSetup } from '../engine/parseSetup.ts';
import type { FourCorners } from '../photo/targetColours.ts';
import { UsageError } from './arguments.ts';
import { decodePhotoFile } from './decodePhoto.ts';
import { runCommand } from './runCommand.ts';

const USAGE = `Usage: npm run --silent camera -- PHOTO --corners "x,y x,y x,y x,y" --out camera.json [--name NAME]
  [--daylight K | --illuminant ID]

Fits the camera to a photo of the 24-patch colour target. The corners are the outer corners of its four outer patches,
going round, from any of them, in upright photo pixels. The light is daylight of 6500 K unless it is named.
camera.json goes into a set-up: {"film": "soap", "camera": {"fit": true, "kept": ...}}.
Exit codes: 0 done, 2 bad input (one line on stderr says what).`;

function parseCorners(text: string): FourCorners {
  const corners = text
    .trim()
    .split(/\s+/)
    .map((pair) => pair.split(',').map(Number));
  if (corners.length !== 4 || corners.some((at) => at.length !== 2 || !at.every(Number.isFinite)))
    throw new UsageError('Give --corners as four places, such as "62,51 419,74 402,301 48,289".');
  return corners as unknown as FourCorners;
}

function parse(argv: readonly string[]) {
  const { values, positionals } = parseArgs({
    args: [...argv],
    allowPositionals: true,
    options: {
      corners: { type: 'string' },
      out: { type: 'string' },
      name: { type: 'string' },
      daylight: { type: 'string' },
      illuminant: { type: 'string' },
      help: { type: 'boolean', short: 'h' },
    },
  });
  return { ...values, photo: positionals.length === 1 ? positionals[0] : undefined };
}

/** The arguments, with what node says of unknown ones as one line. */
function parsed(argv: readonly string[]): ReturnType<typeof parse> {
  try {
    return parse(argv);
  } catch (error) {
    throw new UsageError(error instanceof Error ? error.message : String(error));
  }
}

async function main(): Promise<number> {
  const options = parsed(process.argv.slice(2));
  if (options.help) {
    console.log(USAGE);
    return 0;
  }
  const { photo: path, corners, out } = options;
  if (!path || !corners || !out)
    throw new UsageError('Give one PHOTO, --corners and --out; say --help for how to use it.');
  if (options.illuminant && !ILLUMINANT_IDS.some((id) => id === options.illuminant))
    throw new UsageError(
      `There is no illuminant "${options.illuminant}"; known are ${ILLUMINANT_IDS.join(', ')}.`,
    );
  // The set-up's own checks say what a light may be.
  const { light } = parseSetup({
    film: 'soap',
    ...(options.daylight ? { light: { daylightK: Number(options.daylight) } } : {}),
    ...(options.illuminant ? { light: { illuminant: options.illuminant } } : {}),
  });
  const { pixels, metadata } = await decodePhotoFile(path);
  const reading = measureTarget(pixels, parseCorners(corners), light);
  const { cameraMake: make, cameraModel: model } = metadata;
  const name = options.name || cameraNameFrom(make, model) || 'camera';
  const kept = nameCamera(reading.camera, name, new Date().toISOString(), { make, model });
  try {
    await writeFile(out, `${JSON.stringify(kept)}\n`);
  } catch {
    throw new UsageError(`The file ${out} cannot be written; name another with --out.`);
  }
  console.log(`${reading.advice} Patches are off by ${reading.residualCodes.toFixed(1)} codes of 255.`);
  return 0;
}

await runCommand(main);
