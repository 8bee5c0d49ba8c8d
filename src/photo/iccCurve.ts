import { s15Fixed16, u16be, u32be } from './bytes.ts';

/** Code value 0..1 to linear light 0..1. */
export type ToneCurve = (code: number) => number;

/**
 * Tone curve of a `curv` or `para` element that starts at `at`, or undefined where it is neither or is cut short.
 * ICC.1:2022, 10.6 (curveType: identity, u8Fixed8 gamma, or a table joined by straight lines) and 10.18
 * (parametricCurveType, function types 0 to 4).
 */
export function toneCurve(profile: Uint8Array, at: number): ToneCurve | undefined {
  const type = u32be(profile, at);
  if (type === 0x63757276 /* curv */) return sampledCurve(profile, at);
  if (type === 0x70617261 /* para */) return parametricCurve(profile, at);
  return undefined;
}

function sampledCurve(profile: Uint8Array, at: number): ToneCurve | undefined {
  const count = u32be(profile, at + 8);
  if (at + 12 + 2 * count > profile.length) return undefined;
  if (count === 0) return (code) => code;
  if (count === 1) {
    const gamma = u16be(profile, at + 12) / 256;
    return gamma > 0 ? (code) => code ** gamma : undefined;
  }
  const table = Float64Array.from({ length: count }, (_, i) => u16be(profile, at + 12 + 2 * i) / 65535);
  return (code) => {
    const place = Math.min(Math.max(code, 0), 1) * (count - 1);
    const low = Math.min(Math.floor(place), count - 2);
    return table[low]! + (place - low) * (table[low + 1]! - table[low]!);
  };
}

const PARAMETER_COUNTS = [1, 3, 4, 5, 7];

function parametricCurve(profile: Uint8Array, at: number): ToneCurve | undefined {
  const kind = u16be(profile, at + 8);
  const count = PARAMETER_COUNTS[kind];
  if (count === undefined || at + 12 + 4 * count > profile.length) return undefined;
  const p = (index: number) => (index < count ? s15Fixed16(profile, at + 12 + 4 * index) : 0);
  const [gamma, a, b] = kind === 0 ? [p(0), 1, 0] : [p(0), p(1), p(2)];
  if (!(gamma > 0)) return undefined;
  // Types 1 and 2 break where the base of the power reaches 0, and go on with a constant; 3 and 4 state the break.
  const [breakAt, slope, low, lift] =
    kind === 0
      ? [0, 0, 0, 0]
      : kind === 1
        ? [-b / a, 0, 0, 0]
        : kind === 2
          ? [-b / a, 0, p(3), p(3)]
          : [p(4), p(3), p(6), p(5)];
  if (!Number.isFinite(breakAt)) return undefined;
  return (code) => (code >= breakAt ? Math.max(0, a * code + b) ** gamma + lift : slope * code + low);
}

/**
 * The inverse of a rising curve by bisection to 2^-40: slow, but right for every kind of curve. Callers in loops make a
 * table.
 */
export function inverseCurve(decode: ToneCurve): ToneCurve {
  return (linear) => {
    let low = 0;
    let high = 1;
    for (let step = 0; step < 40; step++) {
      const middle = (low + high) / 2;
      if (decode(middle) < linear) low = middle;
      else high = middle;
    }
    return (low + high) / 2;
  };
}
