/** Readings kept a place for the order step. */
export const MOST_CANDIDATES = 5;

/**
 * Candidate readings on a grid of places (every pixel, or every few): flat arrays with MOST_CANDIDATES a place.
 * A place without candidates is no film: hull, glint, foam.
 */
export interface CandidateField {
  readonly width: number;
  readonly height: number;
  /** Pixels between places. */
  readonly spacing: number;
  readonly count: Uint8Array;
  readonly thicknessNm: Float32Array;
  /** One standard deviation of each reading, nm. */
  readonly sdNm: Float32Array;
  /** Minus the log evidence of each reading, relative to the best at its place, capped. */
  readonly cost: Float32Array;
}

export function makeCandidateField(width: number, height: number, spacing: number): CandidateField {
  const places = width * height;
  return {
    width,
    height,
    spacing,
    count: new Uint8Array(places),
    thicknessNm: new Float32Array(places * MOST_CANDIDATES),
    sdNm: new Float32Array(places * MOST_CANDIDATES),
    cost: new Float32Array(places * MOST_CANDIDATES),
  };
}
