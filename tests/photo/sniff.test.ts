import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import sharp from 'sharp';
import { expect, test } from 'vitest';
import { formatOf, sniff } from '../../src/photo/sniff.ts';
import { asSharp, encode, encodePng16, type Kind, slopes } from './madePhotos.ts';

const picture = slopes(50, 31);

test.each(['jpeg', 'png', 'webp', 'avif'] as Kind[])(
  '%s: type and size from the header, as libvips has them',
  async (kind) => {
    const bytes = await encode(picture, kind);
    const says = await sharp(bytes).metadata();
    expect(sniff(bytes)).toMatchObject({
      format: kind,
      width: says.width,
      height: says.height,
      bitDepth: 8,
      colourModel: 'rgb',
      hasAlpha: false,
      complete: true,
    });
  },
);

test('lossy and lossless WebP, with and without a fourth channel', async () => {
  const seeThrough = asSharp(picture).ensureAlpha(0.5);
  for (const options of [{ lossless: true }, { lossless: false }]) {
    expect(sniff(await asSharp(picture).webp(options).toBuffer())).toMatchObject({
      width: 50,
      height: 31,
      hasAlpha: false,
    });
    expect(sniff(await seeThrough.clone().webp(options).toBuffer())).toMatchObject({
      width: 50,
      height: 31,
      hasAlpha: true,
    });
  }
});

test('bit depth of PNG and AVIF, and progressive JPEG', async () => {
  expect(sniff(await encodePng16(new Uint16Array(12 * 3), 4, 3)).bitDepth).toBe(16);
  expect(sniff(await asSharp(picture).avif({ bitdepth: 10 }).toBuffer()).bitDepth).toBe(10);
  expect(sniff(await asSharp(picture).avif({ lossless: true }).ensureAlpha(0.5).toBuffer()).hasAlpha).toBe(
    true,
  );
  expect(sniff(await asSharp(picture).jpeg({ progressive: true }).toBuffer())).toMatchObject({
    width: 50,
    complete: true,
  });
});

test('HEIC: type, size, soundness', () => {
  const heic = readFileSync(join(import.meta.dirname, 'data/gradient.heic'));
  expect(sniff(heic)).toMatchObject({ format: 'heic', width: 64, height: 48, complete: true });
  expect(sniff(heic.subarray(0, 500)).complete).toBe(false);
});

test.each(['jpeg', 'png', 'webp', 'avif'] as Kind[])(
  '%s: every cut is seen, but for padding at the very end',
  async (kind) => {
    const bytes = await encode(picture, kind);
    for (let length = 12; length < bytes.length - 1; length += 7)
      expect(sniff(bytes.subarray(0, length)).complete, `${length} of ${bytes.length}`).toBe(false);
  },
);

test('a picture inside a JPEG’s EXIF does not count as its end', async () => {
  const thumbnail = await encode(slopes(16, 16), 'jpeg');
  const body = Buffer.concat([Buffer.from('Exif\0\0'), thumbnail]);
  const head = Buffer.from([0xff, 0xd8, 0xff, 0xe1, (body.length + 2) >> 8, (body.length + 2) & 255]);
  const jpeg = await encode(picture, 'jpeg');
  const whole = Buffer.concat([head, body, jpeg.subarray(2)]);
  expect(sniff(whole)).toMatchObject({ width: 50, height: 31, complete: true });
  expect(sniff(whole.subarray(0, whole.length - 40)).complete).toBe(false);
});

test('a cropped and turned AVIF has the size of what is shown (ISO/IEC 14496-12, 12.1.4; 23008-12, 6.5.10)', () => {
  const u32 = (...values: number[]) =>
    values.flatMap((v) => [v >>> 24, (v >> 16) & 255, (v >> 8) & 255, v & 255]);
  const box = (type: string, ...body: number[][]) => {
    const content = body.flat();
    return [...u32(content.length + 8), ...Buffer.from(type), ...content];
  };
  const ispe = box('ispe', u32(0, 4000, 3000));
  const clap = box('clap', u32(3800, 1, 5800, 2, 0, 1, 0, 1));
  const irot = box('irot', [1]);
  const ipma = box('ipma', u32(0, 1), [0, 1, 3, 1, 2, 3]);
  const meta = box(
    'meta',
    u32(0),
    box('pitm', u32(0), [0, 1]),
    box('iprp', box('ipco', ispe, clap, irot), ipma),
  );
  const file = Uint8Array.from([...box('ftyp', [...Buffer.from('avif')], u32(0)), ...meta]);
  expect(sniff(file)).toMatchObject({ format: 'avif', width: 2900, height: 3800 });
});

test('other kinds of file are told apart', async () => {
  expect(formatOf(await asSharp(picture).tiff().toBuffer())).toBe('tiff');
  expect(formatOf(await asSharp(picture).gif().toBuffer())).toBe('gif');
  expect(formatOf(Buffer.from('%PDF-1.7'))).toBe('unknown');
  expect(formatOf(Buffer.from('\0\0\0\x18ftypmp42\0\0\0\0mp42isom', 'latin1'))).toBe('unknown');
  expect(formatOf(new Uint8Array())).toBe('unknown');
});
