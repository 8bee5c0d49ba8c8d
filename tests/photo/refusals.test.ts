import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import fc from 'fast-check';
import { expect, test } from 'vitest';
import { decodePhotoBytes, decodePhotoFile } from '../../src/cli/decodePhoto.ts';
import { PhotoError } from '../../src/photo/types.ts';
import { asSharp, encode, type Kind, scratch, slopes, writeTagged } from './madePhotos.ts';
import { phoneP3 } from './madeProfile.ts';
import { pngChunk } from './pngChunks.ts';

const picture = slopes();
const refused = (bytes: Uint8Array) =>
  decodePhotoBytes(bytes, 'a').then(
    () => 'opened',
    (error: unknown) => (error instanceof PhotoError ? error.message : `not a PhotoError: ${error}`),
  );

test('each kind of file that cannot be opened says what to do', async () => {
  expect(await refused(new Uint8Array())).toMatch(/empty.*wait/);
  expect(await refused(Buffer.from('hello'))).toMatch(/Choose a JPEG/);
  expect(await refused(await asSharp(picture).tiff().toBuffer())).toMatch(/raw photo \(DNG\).*Export/);
  expect(await refused(await asSharp(picture).gif().toBuffer())).toMatch(/GIF/);
  expect(await refused(readFileSync(join(import.meta.dirname, 'data/gradient.heic')))).toMatch(/HEIC.*JPEG/);
  const jpeg = await encode(picture, 'jpeg');
  expect(await refused(jpeg.subarray(0, jpeg.length / 2))).toMatch(/cut short.*copy it again/);
  const header = Buffer.alloc(13);
  header.writeUInt32BE(60_000, 0);
  header.writeUInt32BE(60_000, 4);
  header.set([8, 2, 0, 0, 0], 8);
  const huge = Buffer.concat([
    Buffer.from('\x89PNG\r\n\x1a\n', 'latin1'),
    pngChunk('IHDR', header),
    pngChunk('IEND', []),
  ]);
  expect(await refused(huge)).toMatch(/60000 x 60000/);
});

test('a file that is not there is one clear line', async () => {
  await expect(decodePhotoFile('no/such/photo.jpg')).rejects.toThrow(
    /^no\/such\/photo\.jpg .*no such file\.$/,
  );
  await expect(decodePhotoFile('no/such/photo.jpg')).rejects.toBeInstanceOf(PhotoError);
});

test.each(['jpeg', 'png', 'webp', 'avif'] as Kind[])(
  '%s: no cut and no ruin gives anything but a photo or a PhotoError',
  async (kind) => {
    const files = scratch();
    const profile = writeTagged(files.path('p3.icm'), phoneP3(), []);
    const tagged = await asSharp(picture).withIccProfile(profile).toFormat(kind).toBuffer();
    const path = writeTagged(files.path(`a.${kind}`), tagged, [
      '-Orientation#=6',
      '-GPSLatitude=5',
      '-GPSLatitudeRef=N',
      '-GPSLongitude=5',
      '-GPSLongitudeRef=E',
      '-Make=Maker',
    ]);
    const whole = new Uint8Array(readFileSync(path));
    files.remove();
    let opened = 0;
    await fc.assert(
      fc.asyncProperty(
        fc.option(fc.nat(whole.length), { nil: whole.length, freq: 3 }),
        // Half the hits go to the first 900 bytes, where all the structure is.
        fc.array(
          fc.tuple(fc.oneof(fc.nat(Math.min(900, whole.length - 1)), fc.nat(whole.length - 1)), fc.nat(255)),
          { maxLength: 6 },
        ),
        async (length, changes) => {
          const bytes = whole.slice(0, length);
          for (const [at, value] of changes) if (at < length) bytes[at] = value;
          const outcome = await refused(bytes);
          expect(outcome).not.toMatch(/not a PhotoError/);
          if (outcome === 'opened') opened++;
        },
      ),
      { numRuns: 150, seed: 20 },
    );
    // The run must have tried both doors.
    expect(opened).toBeGreaterThan(0);
    expect(opened).toBeLessThan(150);
  },
);
