import { decode, encode } from 'fast-png';

/** PNG bytes of 8-bit RGB pixels, 3 bytes a pixel, row by row from the top left, with texts by keyword (tEXt chunks). */
export function encodeRgbPng(image: {
  readonly width: number;
  readonly height: number;
  readonly rgb: Uint8Array;
  readonly texts?: Readonly<Record<string, string>>;
}): Uint8Array {
  const { width, height, rgb, texts } = image;
  return encode({ width, height, data: rgb, channels: 3, depth: 8, ...(texts && { text: texts }) });
}

/** Texts of a PNG by keyword. @throws Error where it is no PNG */
export function pngTexts(png: Uint8Array): Readonly<Record<string, string>> {
  return decode(png).text;
}
