import type { Random } from './random.ts';

/** Maps an encoded value 0..1 (sRGB transfer already applied) to the value the camera writes, 0..1, rising. */
export type ToneCurve =
  | { readonly shape: 'none' }
  /** y = e + 2k e(1-e)(2e-1): steeper in the middle for k > 0, symmetric about 0.5. Rising for -1 < k < 0.5. */
  | { readonly shape: 'sigmoid'; readonly strength: number }
  /** A gamma, then a logistic toe and shoulder centred off the middle, scaled to keep 0 and 1. */
  | {
      readonly shape: 'filmic';
      readonly gamma: number;
      readonly steepness: number;
      readonly centre: number;
    };

function logistic(x: number): number {
  return 1 / (1 + Math.exp(-x));
}

/** The curve as a function of one encoded value; input is clamped to 0..1. */
export function toneFunction(curve: ToneCurve): (encoded: number) => number {
  if (curve.shape === 'none') {
    return (e) => Math.min(1, Math.max(0, e));
  }
  if (curve.shape === 'sigmoid') {
    const k = curve.strength;
    return (input) => {
      const e = Math.min(1, Math.max(0, input));
      return e + 2 * k * e * (1 - e) * (2 * e - 1);
    };
  }
  const { gamma, steepness, centre } = curve;
  const low = logistic(-steepness * centre);
  const high = logistic(steepness * (1 - centre));
  return (input) => {
    const e = Math.min(1, Math.max(0, input)) ** gamma;
    return (logistic(steepness * (e - centre)) - low) / (high - low);
  };
}

/** An S curve of a strength that phones have: mostly more contrast, seldom a little less. */
export function drawSigmoid(random: Random): ToneCurve {
  return { shape: 'sigmoid', strength: random.uniform(-0.05, 0.35) };
}

/** A skewed curve (toe and shoulder of different strength, gamma off by up to 12 %), which the sigmoid cannot imitate. */
export function drawFilmic(random: Random): ToneCurve {
  return {
    shape: 'filmic',
    gamma: random.uniform(0.88, 1.12),
    steepness: random.uniform(1.5, 3.5),
    centre: random.uniform(0.35, 0.55),
  };
}
