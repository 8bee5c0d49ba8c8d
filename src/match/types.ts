/** What became of one pixel. Stored as a byte in `ThicknessMap.status`. */
export const PIXEL_STATUS = {
  /** Outside the region of interest, or not looked at. */
  outside: 0,
  /** A thickness with an interval. */
  measured: 1,
  /** Bare surface: thickness 0. */
  bare: 2,
  /** No film colour: glint, foam, hull, clipped or too dark. */
  noFilmColour: 3,
  /** Film, but past the resolvable range: `lowNm` is a lower bound, thickness and high are NaN. */
  atLeast: 4,
  /** Film colour, but two orders or more fit alike: `thicknessNm` is the likeliest, the interval spans its own order only. */
  ambiguous: 5,
} as const;
export type PixelStatus = (typeof PIXEL_STATUS)[keyof typeof PIXEL_STATUS];

/** Row by row from the top left of the upright photo; NaN where there is no answer. */
export interface ThicknessMap {
  readonly width: number;
  readonly height: number;
  readonly thicknessNm: Float32Array;
  readonly lowNm: Float32Array;
  readonly highNm: Float32Array;
  /** Interference order, 1 from the first bright band; 0 for bare, 255 for none. */
  readonly order: Uint8Array;
  readonly status: Uint8Array;
}

/** One way of reading a colour. Sorted by `share`, largest first. */
export interface Reading {
  readonly thicknessNm: number;
  readonly lowNm: number;
  readonly highNm: number;
  readonly order: number;
  /** Posterior probability of this reading among all film thicknesses. */
  readonly share: number;
}
