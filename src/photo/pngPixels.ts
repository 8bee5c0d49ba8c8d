import { DAMAGED_SENTENCE } from './refusal.ts';
import { PhotoError } from './types.ts';

export interface PngPixels {
  readonly width: number;
  readonly height: number;
  readonly channels: 3 | 4;
  readonly maxCode: 255 | 65535;
  readonly codes: Uint8Array | Uint8ClampedArray | Uint16Array;
}

/**
 * Decodes a PNG of 8 or 16 bits (not indexed) with its exact codes: a canvas would cut 16 bits to 8, and multiply by
 * a fourth channel and divide again. Grey is repeated.
 * @throws PhotoError where the file is damaged
 */
export async function decodePngExactly(bytes: Uint8Array): Promise<PngPixels> {
  const { decode } = await import('fast-png');
  try {
    const { width, height, data, channels, depth } = decode(bytes);
    const maxCode = depth === 16 ? 65535 : 255;
    if (channels === 3 || channels === 4) return { width, height, channels, maxCode, codes: data };
    const codes = depth === 16 ? new Uint16Array(width * height * 3) : new Uint8Array(width * height * 3);
    for (let from = 0, to = 0; to < codes.length; from += channels, to += 3)
      codes.fill(data[from]!, to, to + 3);
    return { width, height, channels: 3, maxCode, codes };
  } catch (cause) {
    throw new PhotoError(DAMAGED_SENTENCE, { cause });
  }
}
