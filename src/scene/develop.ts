import { encodeSrgb } from '../colour/rgb.ts';
import type { Random } from './random.ts';
import { type ToneCurve, toneFunction } from './toneCurve.ts';

/** What a camera does between its white-balanced raw values and the codes it writes. */
export interface Development {
  /** Row-major 3 x 3 from raw (white = 1, 1, 1) to linear sRGB, white balance error included. */
  readonly matrix: Float64Array;
  /** Common factor on linear light. */
  readonly exposure: number;
  /** Linear light added a channel after exposure. */
  readonly veil: readonly [number, number, number];
  readonly tone: ToneCurve;
  /** One standard deviation of noise a channel, in codes of 255, before rounding. */
  readonly noiseCodes: number;
}

/** Linear light to sRGB encoded 0..1, clamped at both ends as a file clamps it. */
function encodeClamped(linear: number): number {
  return linear <= 0 ? 0 : linear >= 1 ? 1 : encodeSrgb(linear);
}

/** The codes (0..255, not yet rounded) that raw values give without noise; for checks and for the exposure meter. */
export function codesOfRaw(raw: ArrayLike<number>, development: Development): [number, number, number] {
  const tone = toneFunction(development.tone);
  const m = development.matrix;
  const code = (c: number) => {
    const light = m[3 * c]! * raw[0]! + m[3 * c + 1]! * raw[1]! + m[3 * c + 2]! * raw[2]!;
    return 255 * tone(encodeClamped(development.exposure * light + development.veil[c]!));
  };
  return [code(0), code(1), code(2)];
}

/** Develops a picture: `raw` holds 3 values a pixel, the result 3 codes a pixel. */
export function developPhoto(raw: Float32Array, development: Development, random: Random): Uint8Array {
  const codes = new Uint8Array(raw.length);
  const tone = toneFunction(development.tone);
  const { matrix: m, exposure, veil, noiseCodes } = development;
  for (let i = 0; i < raw.length; i += 3) {
    const r = raw[i]!;
    const g = raw[i + 1]!;
    const b = raw[i + 2]!;
    for (let c = 0; c < 3; c++) {
      const light = exposure * (m[3 * c]! * r + m[3 * c + 1]! * g + m[3 * c + 2]! * b) + veil[c]!;
      const code = 255 * tone(encodeClamped(light)) + noiseCodes * random.normal();
      codes[i + c] = code <= 0 ? 0 : code >= 255 ? 255 : Math.round(code);
    }
  }
  return codes;
}
