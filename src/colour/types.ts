/**
 * The three rows that turn a reflectance spectrum into three channel values for one light:
 * value_c = sum over i of weights[c * count + i] * R(wavelengthNm[i]).
 * Normalised so that a perfect white reflector gives the white of the space (1, 1, 1 for RGB; XYZ with Y = 1).
 */
export interface ChannelWeights {
  readonly wavelengthNm: Float64Array;
  /** Row-major 3 x wavelengthNm.length. */
  readonly weights: Float64Array;
}

/** An RGB code space of a photo: linear values in its own primaries, and its tone transfer. */
export interface RgbEncoding {
  /** 'srgb', 'display-p3', or the description of the embedded profile. */
  readonly id: string;
  /** Row-major 3 x 3, linear RGB to XYZ with Y = 1 for white (1, 1, 1), for the white `whiteXyz`. */
  readonly toXyz: Float64Array;
  readonly whiteXyz: readonly [number, number, number];
  /** Linear light 0..1 to code value 0..1; values outside are clamped by the caller. */
  readonly encode: (linear: number) => number;
  /** Code value 0..1 to linear light 0..1. */
  readonly decode: (code: number) => number;
}

/** What lights the film: the mirror image of the sky, or a lamp. */
export type Light = { readonly daylightK: number } | { readonly illuminant: IlluminantId };

export type IlluminantId =
  | 'A'
  | 'D50'
  | 'D55'
  | 'D65'
  | 'D75'
  | 'FL2'
  | 'FL11'
  | 'LED-B1'
  | 'LED-B2'
  | 'LED-B3'
  | 'LED-B4'
  | 'LED-B5';
