import { PIXEL_STATUS, type PixelStatus, type ThicknessMap } from '../../src/match/types.ts';

/** What one pixel of a made-up map holds. */
export interface MadePixel {
  readonly status: PixelStatus;
  readonly nm?: number;
  readonly low?: number;
  readonly high?: number;
}

export const film = (nm: number, half = 5): MadePixel => ({
  status: PIXEL_STATUS.measured,
  nm,
  low: nm - half,
  high: nm + half,
});
export const bare: MadePixel = { status: PIXEL_STATUS.bare, nm: 0, low: 0, high: 3 };
export const glint: MadePixel = { status: PIXEL_STATUS.noFilmColour };
export const outside: MadePixel = { status: PIXEL_STATUS.outside };
export const atLeast = (low: number): MadePixel => ({ status: PIXEL_STATUS.atLeast, low });
export const ambiguous = (nm: number, half = 5): MadePixel => ({
  ...film(nm, half),
  status: PIXEL_STATUS.ambiguous,
});

/** A map whose pixel (x, y) is what `at` says. */
export function madeMap(
  width: number,
  height: number,
  at: (x: number, y: number) => MadePixel,
): ThicknessMap {
  const pixels = width * height;
  const map: ThicknessMap = {
    width,
    height,
    thicknessNm: new Float32Array(pixels).fill(Number.NaN),
    lowNm: new Float32Array(pixels).fill(Number.NaN),
    highNm: new Float32Array(pixels).fill(Number.NaN),
    order: new Uint8Array(pixels).fill(255),
    status: new Uint8Array(pixels),
  };
  for (let y = 0; y < height; y++) {
    for (let x = 0; x < width; x++) {
      const i = y * width + x;
      const made = at(x, y);
      map.status[i] = made.status;
      map.thicknessNm[i] = made.nm ?? Number.NaN;
      map.lowNm[i] = made.low ?? Number.NaN;
      map.highNm[i] = made.high ?? Number.NaN;
    }
  }
  return map;
}

export const evenArea = (pixels: number, m2: number) => new Float32Array(pixels).fill(m2);
