import type { ThicknessMap } from '../match/types.ts';

/** What is to be tallied: a thickness map with the water area of each pixel. All arrays run row by row, one entry a pixel. */
export interface FilmRegion {
  readonly map: ThicknessMap;
  /** Square metres; NaN or 0 where the view leaves the pixel out. */
  readonly areaM2: Float32Array;
  /** Non-zero inside; all of the map where absent. Pixels that the map calls outside never count. */
  readonly region?: Uint8Array;
}

/** @throws RangeError where the arrays are not all of the map's size */
export function mustFit({ map, areaM2, region }: FilmRegion): void {
  const pixels = map.width * map.height;
  if (areaM2.length !== pixels || (region && region.length !== pixels)) {
    throw new RangeError(
      `The map has ${map.width} × ${map.height} pixels, but the areas ${areaM2.length}${region ? ` and the region ${region.length}` : ''}.`,
    );
  }
}
