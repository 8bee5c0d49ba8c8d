import type { Blur, FilmStack, Polarisation } from '../optics/types.ts';

/** The optical side of a set-up: everything that fixes the reflectance. */
export interface FilmScene {
  readonly stack: FilmStack;
  readonly incidenceRad: number;
  readonly polarisation: Polarisation;
  readonly blur: Blur;
}

/** Components of one sensor channel: the family's mean and its three principal components. */
export const COMPONENTS = 4;
/** Channels times components: the length of one row of a basis table. */
export const ROW = 3 * COMPONENTS;

/**
 * What each sensor component records of the film, thickness by thickness, and how that changes with the two things
 * a set-up does not know exactly. Rows are [r0 r1 r2 r3 g0 .. g3 b0 .. b3]; component 0 is the family's mean.
 *
 * Thickness here is *nominal*: the thickness that the nominal index at the nominal angle would need for the same
 * optical path. An index shift at a fixed path changes contrast only, so `perIndex` is small and close to linear.
 */
export interface FilmBasis {
  readonly stepNm: number;
  readonly count: number;
  readonly table: Float64Array;
  readonly perIndex: Float64Array;
  /** Per mired (10^6 / K) of the light's correlated colour temperature; zero for a lamp. */
  readonly perMired: Float64Array;
  /** The rows of a perfect white reflector, which normalise each channel. */
  readonly white: Float64Array;
  readonly whitePerMired: Float64Array;
}
