import { fractalNoise, smoothStep } from '../smoothNoise.ts';

/** Paints a place (across, up) of an upright surface into `out`; false where there is nothing. */
export type Paint = (a: number, b: number, out: Float64Array) => boolean;

/** A far upright plane Y = const with a painted picture on it. */
export interface Backdrop {
  readonly y: number;
  readonly paint: Paint;
}

/** Writes a colour times a shade. */
export function put(out: Float64Array, r: number, g: number, b: number, shade: number): void {
  out[0] = r * shade;
  out[1] = g * shade;
  out[2] = b * shade;
}

/** A stone wall 1.9 m high that ends at `toX`, wet and weedy at its foot. */
export function farWall(seed: number, toX: number): Paint {
  const stain = fractalNoise(seed, 4);
  const streak = fractalNoise(seed + 1, 3);
  return (x, z, out) => {
    if (z > 1.9 || x > toX) {
      return false;
    }
    const course = Math.floor(z / 0.38);
    const along = x / 0.95 + 0.5 * (course & 1);
    const inJoint =
      Math.abs(z / 0.38 - Math.round(z / 0.38)) < 0.05 || Math.abs(along - Math.round(along)) < 0.02;
    const weather = 1 + 0.35 * stain(x * 0.7, z * 1.6) + 0.25 * streak(x * 2.2, z * 0.3);
    const stone = 1 + 0.18 * Math.sin(Math.floor(along) * 12.9898 + course * 78.233);
    const wet = smoothStep(0.15, 0.55, z);
    const cap = z > 1.62 ? 1.45 : 1;
    const shade = 0.105 * weather * stone * cap * (inJoint ? 0.65 : 1) * (0.4 + 0.6 * wet);
    put(out, 1.06 - 0.18 * (1 - wet), 1 + 0.02 * (1 - wet), 0.9 - 0.2 * (1 - wet), shade);
    return true;
  };
}

/** A low shore far across open water, pale with haze: its foot shows where the horizon is. */
export function farShore(seed: number): Paint {
  const skyline = fractalNoise(seed + 3, 5);
  const woods = fractalNoise(seed + 4, 3);
  return (x, z, out) => {
    if (z > 30 + 34 * skyline(x / 420, 0.5)) {
      return false;
    }
    put(out, 0.86, 0.97, 1.1, 0.23 * (1 + 0.12 * woods(x / 60, z / 14)));
    return true;
  };
}

/** Sheds behind the wall. */
export function sheds(seed: number): Paint {
  const grime = fractalNoise(seed + 2, 3);
  const buildings = [
    { from: -30, to: -16.5, top: 5.6, rgb: [0.1, 0.058, 0.048] },
    { from: -15.9, to: -8.2, top: 4.3, rgb: [0.15, 0.145, 0.13] },
    { from: -6.5, to: 1.5, top: 6.1, rgb: [0.07, 0.085, 0.088] },
  ] as const;
  return (x, z, out) => {
    for (const house of buildings) {
      if (x < house.from || x > house.to || z > house.top) {
        continue;
      }
      const along = (x - house.from) / 2.4;
      const cell = along - Math.floor(along);
      const pane = cell > 0.3 && cell < 0.7 && z > 2.6 && z < 3.7;
      const roof = z > house.top - 0.35;
      const ribs = 1 + 0.06 * Math.sin(x * 14);
      const shade = ribs * (1 + 0.25 * grime(x * 0.5, z * 1.5)) * (pane ? 0.35 : roof ? 0.6 : 1);
      put(out, house.rgb[0], house.rgb[1], house.rgb[2], shade);
      return true;
    }
    return false;
  };
}

/** A small moored boat seen from the side. */
export function hullSide(middleX: number, lengthM: number): Paint {
  return (x, z, out) => {
    const along = (x - middleX) / (lengthM / 2);
    if (Math.abs(along) > 1.12) {
      return false;
    }
    const sheer = 0.78 + 0.28 * along * along + (along < 0 ? 0.12 * along * along : 0);
    const bow = 0.88 + 0.13 * z;
    if (z < sheer && along > -0.93 - 0.06 * z && along < bow) {
      const strake = z > sheer - 0.12;
      const boot = z < 0.14;
      const shade = 1 - 0.35 * Math.abs(along) - 0.2 * (sheer - z);
      if (strake) {
        put(out, 0.24, 0.23, 0.21, shade);
      } else if (boot) {
        put(out, 0.1, 0.03, 0.025, shade);
      } else {
        put(out, 0.018, 0.034, 0.056, shade);
      }
      return true;
    }
    const cabinTop = 1.75 - 0.1 * (along + 0.2);
    if (along > -0.5 && along < 0.16 - 0.08 * (z - 1) && z < cabinTop && z > 0) {
      const glass = z > 1.2 && z < 1.55 && Math.abs(((along + 0.5) * 5) % 1) > 0.16;
      put(out, glass ? 0.03 : 0.27, glass ? 0.035 : 0.27, glass ? 0.04 : 0.26, 0.9);
      return true;
    }
    return false;
  };
}
