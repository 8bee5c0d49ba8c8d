/**
 * The tone curve a phone lays over its encoded values, as three smooth departures from the straight line that keep
 * black at 0 and white at 1: t(e) = e + k1 S(e) + k2 K(e) + k3 Q(e) with
 * S = 2 e (1-e) (2e-1) (steeper middle), K = 4 e (1-e) e (lifted lights), Q = e (1-e) (5 (2e-1)^2 - 1) (fourth order).
 */
export const TONE_TERMS = 3;

export function toneS(e: number): number {
  return 2 * e * (1 - e) * (2 * e - 1);
}

export function toneSkew(e: number): number {
  return 4 * e * e * (1 - e);
}

export function toneFourth(e: number): number {
  const u = 2 * e - 1;
  return e * (1 - e) * (5 * u * u - 1);
}

/** Code value 0..1 for an encoded value 0..1; `k` holds the three strengths from `at` on. */
export function toneOf(e: number, k: Float64Array, at: number): number {
  return e + k[at]! * toneS(e) + k[at + 1]! * toneSkew(e) + k[at + 2]! * toneFourth(e);
}

/** Slope of `toneOf` at e. */
export function toneSlope(e: number, k: Float64Array, at: number): number {
  const u = 2 * e - 1;
  const s = 2 * ((1 - 2 * e) * u + 2 * e * (1 - e));
  const skew = 8 * e - 12 * e * e;
  const fourth = (1 - 2 * e) * (5 * u * u - 1) + e * (1 - e) * 20 * u;
  return 1 + k[at]! * s + k[at + 1]! * skew + k[at + 2]! * fourth;
}
