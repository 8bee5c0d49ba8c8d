/** Mean square slopes of the sea surface (tangents squared, no unit). */
export interface SlopeVariance {
  readonly upwind: number;
  readonly crosswind: number;
  /** A fit of its own to both together, not the sum of the other two. */
  readonly total: number;
}

export type SeaSurface = 'clean' | 'slick';

/** Winds, in m/s, over which the slopes were measured. */
export const MEASURED_WIND_MS = [1, 14] as const;

/**
 * Mean square slopes of wind waves at a wind of `windMS` m/s 12.5 m above the sea, for clean water or under a slick
 * (Cox & Munk 1954, J. Opt. Soc. Am. 44:838, regressions on photographs of sun glitter in the open sea). The lines cross
 * at 1.40 m/s, below which the slick's would be the rougher; there the clean one is taken for both. Outside 1 to 14 m/s
 * this is an extrapolation: still harbour water is smoother than its 0.003.
 * @throws RangeError where the wind is negative
 */
export function slopeVariance(windMS: number, surface: SeaSurface): SlopeVariance {
  if (!(windMS >= 0 && Number.isFinite(windMS))) {
    throw new RangeError('Give the wind in metres a second, 0 or more.');
  }
  const clean = {
    upwind: 3.16e-3 * windMS,
    crosswind: 0.003 + 1.92e-3 * windMS,
    total: 0.003 + 5.12e-3 * windMS,
  };
  const slick = {
    upwind: 0.005 + 0.78e-3 * windMS,
    crosswind: 0.003 + 0.84e-3 * windMS,
    total: 0.008 + 1.56e-3 * windMS,
  };
  return surface === 'slick' && slick.total < clean.total ? slick : clean;
}

/** Standard gravity, m/s^2. */
const GRAVITY = 9.80665;
/** Shortest waves counted, metres: ripples of least phase speed on clean water; oil stills those under about a foot. */
const SHORTEST_WAVE_M = { clean: 0.017, slick: 0.3 };

/**
 * The part of a mean square slope that lies inside one pixel and so blurs its colour; waves longer than the pixel tilt
 * it as a whole instead. In the saturation range of wind waves each octave of wavelength holds the same slope variance
 * (Phillips 1958); it is taken to run from the shortest waves counted to the longest that this wind raises, 2 pi U^2 / g.
 * A rule of ours from that, good to perhaps a factor of two: use it to choose between "sharp" and "blurred".
 */
export function slopeVarianceInsidePixel(
  totalVariance: number,
  pixelOnWaterM: number,
  windMS: number,
  surface: SeaSurface,
): number {
  const shortest = SHORTEST_WAVE_M[surface];
  const longest = Math.max(2 * shortest, (2 * Math.PI * windMS * windMS) / GRAVITY);
  const held = Math.log(Math.min(Math.max(pixelOnWaterM, shortest), longest) / shortest);
  return (totalVariance * held) / Math.log(longest / shortest);
}
