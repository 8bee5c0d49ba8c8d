/**
 * Profiles that are not ours (ArgyllCMS, public domain: tests/photo/data), read against the tools that are not ours:
 * exiftool for what they hold, Little CMS (inside libvips) for what they mean.
 */
import { execFileSync } from 'node:child_process';
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import sharp from 'sharp';
import { expect, test } from 'vitest';
import { decodePhotoBytes } from '../../src/cli/decodePhoto.ts';
import { apply3, bradford, invert3 } from '../../src/colour/matrix3.ts';
import { SRGB } from '../../src/colour/rgb.ts';
import { readIccProfile } from '../../src/photo/iccProfile.ts';
import { PCS_WHITE } from '../../src/photo/knownEncodings.ts';

const data = join(import.meta.dirname, '../photo/data');
const profiles = ['sRGB.icm', 'DisplayP3.icm', 'ClayRGB1998.icm'];

test.each([
  ['sRGB.icm', 'srgb'],
  ['DisplayP3.icm', 'display-p3'],
  ['ClayRGB1998.icm', 'Interchangeable with Adobe RGB (1998)'],
])('%s is recognised by its numbers as %s', (name, id) => {
  const reading = readIccProfile(readFileSync(join(data, name)));
  expect(reading.encoding.id).toBe(id);
  expect(reading.notices).toEqual([]);
});

test.each(profiles)('%s: description and matrix as exiftool reads them', (name) => {
  const path = join(data, name);
  const says = JSON.parse(execFileSync('exiftool', ['-json', path], { encoding: 'utf8' }))[0];
  const { description, encoding } = readIccProfile(readFileSync(path));
  expect(description).toBe(says.ProfileDescription);
  const toPcs = bradford(encoding.whiteXyz, PCS_WHITE);
  for (const [channel, tag] of [
    [[1, 0, 0], says.RedMatrixColumn],
    [[0, 1, 0], says.GreenMatrixColumn],
    [[0, 0, 1], says.BlueMatrixColumn],
  ] as const) {
    const ours = apply3(toPcs, apply3(encoding.toXyz, channel));
    // One step of the profile's s15Fixed16 numbers (1.5e-5) and half the last printed digit (5e-6).
    const tolerance = 2.1e-5;
    String(tag)
      .split(' ')
      .forEach((value, index) => {
        expect(Math.abs(ours[index]! - Number(value))).toBeLessThan(tolerance);
      });
  }
});

test.each(profiles)('%s: colours come out as Little CMS converts them to sRGB, to a code', async (name) => {
  const codes = new Uint8Array(12 * 12 * 3);
  // Muted colours, inside every one of these gamuts: outside, the two would clip in their own ways.
  for (let i = 0; i < 144; i++)
    codes.set([90 + (i % 12) * 10, 95 + Math.floor(i / 12) * 9, 80 + ((i * 7) % 12) * 10], i * 3);
  const png = await sharp(codes, { raw: { width: 12, height: 12, channels: 3 } })
    .png()
    .withIccProfile(join(data, name), { attach: true })
    .toBuffer();
  const { pixels } = await decodePhotoBytes(png, 'a.png');
  const converted = await sharp(png).raw().toBuffer();
  const fromXyz = invert3(SRGB.toXyz);
  const adapted = bradford(pixels.encoding.whiteXyz, SRGB.whiteXyz);
  let largest = 0;
  for (let i = 0; i < 144; i++) {
    const linear = [0, 1, 2].map((c) => pixels.encoding.decode(pixels.codes[i * 3 + c]! / 255));
    const xyz = apply3(adapted, apply3(pixels.encoding.toXyz, linear as [number, number, number]));
    apply3(fromXyz, xyz).forEach((value, c) => {
      largest = Math.max(largest, Math.abs(SRGB.encode(value) * 255 - converted[i * 3 + c]!));
    });
  }
  // Little CMS rounds to whole codes (half a code), and computes 8-bit pictures in fixed point (seen: 0.014 codes more).
  expect(largest).toBeLessThan(0.55);
});
