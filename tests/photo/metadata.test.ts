import { execFileSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { afterAll, expect, test } from 'vitest';
import { decodePhotoBytes, decodePhotoFile } from '../../src/cli/decodePhoto.ts';
import { isoTime } from '../../src/photo/exifTime.ts';
import { encode, scratch, slopes, writeTagged } from './madePhotos.ts';

const files = scratch();
afterAll(files.remove);
const jpeg = await encode(slopes(), 'jpeg');
const open = (name: string, tags: string[]) => decodePhotoFile(writeTagged(files.path(name), jpeg, tags));

test('a clock without an offset stays without one, and says so', async () => {
  const { metadata, notices } = await open('local.jpg', ['-DateTimeOriginal=2024:03:09 07:08:09']);
  expect(metadata.takenAt).toBe('2024-03-09T07:08:09');
  expect(metadata.takenAtHasOffset).toBe(false);
  expect(notices.join()).toMatch(/no time zone/);
});

test('the offset of the last change is not the offset of the photo', async () => {
  const { metadata } = await open('other.jpg', [
    '-DateTimeOriginal=2024:03:09 07:08:09',
    '-OffsetTime=+02:00',
  ]);
  expect(metadata.takenAtHasOffset).toBe(false);
});

test.each([
  ['2024:02:29 23:59:59', '+05:45', undefined, '2024-02-29T23:59:59+05:45'],
  ['2024:03:09 07:08:09', 'Z', '5', '2024-03-09T07:08:09.5Z'],
  ['2024:03:09 07:08:09', '+25:00', 'x', '2024-03-09T07:08:09'],
  ['2023:02:29 12:00:00', undefined, undefined, undefined],
  ['1900:02:29 12:00:00', undefined, undefined, undefined],
  ['2024:13:01 12:00:00', undefined, undefined, undefined],
  ['0000:00:00 00:00:00', undefined, undefined, undefined],
  ['    :  :     :  :  ', undefined, undefined, undefined],
])('time %s %s', (date, offset, subSeconds, text) => {
  expect(isoTime(date, offset, subSeconds)?.text).toBe(text);
});

test('values that cannot be are dropped, each with a sentence; the photo opens', async () => {
  const { metadata, notices } = await open('absurd.jpg', [
    '-GPSLatitude#=900',
    '-GPSLatitudeRef=N',
    '-GPSLongitude#=8',
    '-GPSLongitudeRef=E',
    '-GPSImgDirection#=720',
    '-GPSHPositioningError=undef',
    '-FNumber#=0.001',
    '-DateTimeOriginal#=2024:15:40 99:00:00',
  ]);
  expect(metadata.position).toBeUndefined();
  expect(metadata.headingDeg).toBeUndefined();
  expect(metadata.fNumber).toBeUndefined();
  expect(metadata.takenAt).toBeUndefined();
  for (const name of ['position', 'compass direction', 'f-number', 'date'])
    expect(
      notices.some((notice) => notice.includes(name)),
      name,
    ).toBe(true);
});

test('numbers without a value (0/0) are dropped', async () => {
  const { metadata } = await open('undefined.jpg', [
    '-GPSImgDirection=undef',
    '-GPSHPositioningError=inf',
    '-ExposureTime=undef',
  ]);
  expect(metadata).not.toHaveProperty('headingDeg');
  expect(metadata).not.toHaveProperty('position');
  expect(metadata).not.toHaveProperty('exposureTimeS');
});

test('0, 0 is what cameras write without a fix', async () => {
  const { metadata, notices } = await open('null.jpg', [
    '-GPSLatitude#=0',
    '-GPSLatitudeRef=N',
    '-GPSLongitude#=0',
    '-GPSLongitudeRef=E',
  ]);
  expect(metadata.position).toBeUndefined();
  expect(notices.join()).toMatch(/0°, 0°/);
});

test('a 35 mm focal length of 0 means unknown, and is no fault', async () => {
  const { metadata, notices } = await open('zero.jpg', ['-FocalLengthIn35mmFormat#=0']);
  expect(metadata.focalLength35mm).toBeUndefined();
  expect(notices).toEqual([]);
});

test('ruined EXIF never keeps a photo shut', async () => {
  const path = writeTagged(files.path('ruin.jpg'), jpeg, [
    '-Make=Maker',
    '-GPSLatitude=5',
    '-GPSLatitudeRef=N',
  ]);
  const bytes = new Uint8Array(readFileSync(path));
  const start = Buffer.from(bytes).indexOf('Exif') + 6;
  bytes.fill(0xff, start + 2, start + 60);
  const { pixels, notices } = await decodePhotoBytes(bytes, 'ruin.jpg');
  expect(pixels.width).toBe(48);
  expect(notices.join()).toMatch(/EXIF.*cannot be read/);
});

test('the hash is that of the file, as sha256sum has it', async () => {
  const path = writeTagged(files.path('hash.jpg'), jpeg, []);
  const { metadata } = await decodePhotoFile(path);
  expect(metadata.sha256).toBe(execFileSync('sha256sum', [path], { encoding: 'utf8' }).slice(0, 64));
  expect(metadata.sha256).toBe(createHash('sha256').update(jpeg).digest('hex'));
});
