import { encode } from 'fast-png';

/** PNG bytes of 8-bit RGB pixels, 3 bytes a pixel, row by row from the top left. */
export function encodeRgbPng(image: {
  readonly width: number;
  readonly height: number;
  readonly rgb: Uint8Array;
}): Uint8Array {
  return encode({ width: image.width, height: image.height, data: image.rgb, channels: 3, depth: 8 });
}
