import type { Random } from '../random.ts';
import { fractalNoise, smoothStep } from '../smoothNoise.ts';

/**
 * What stands in the harbour, lit by an even grey sky of radiance 1: colours are radiances in camera space after white
 * balance. Made to look like a place; nothing is measured on it.
 */
export interface Surroundings {
  /**
   * First solid along a ray from (ox, oy, oz) in direction (dx, dy, dz): returns its distance in units of the direction's
   * length (Infinity when there is only sky) and writes its colour to `out`.
   */
  readonly trace: (
    ox: number,
    oy: number,
    oz: number,
    dx: number,
    dy: number,
    dz: number,
    out: Float64Array,
  ) => number;
  readonly sky: (dx: number, dy: number, dz: number, out: Float64Array) => void;
  /** Whether solid ground covers the water here (the quay's footprint). */
  readonly isLand: (x: number, y: number) => boolean;
}

export interface SurroundingsOptions {
  /** Quay face on the left at this X (metres), its top at this height. */
  readonly quayX: number;
  readonly quayTopM: number;
  /** Far quay wall at this Y. */
  readonly farY: number;
  /** Post standing in the water: X, Y, radius, top. Null for none. */
  readonly post: readonly [number, number, number, number] | null;
  /** Floating boom from one place to another on the water. Null for none. */
  readonly boom: { readonly from: readonly [number, number]; readonly to: readonly [number, number] } | null;
  /** Moored hull: X of its middle, Y, length. Null for none. */
  readonly hull: readonly [number, number, number] | null;
  /** How much brighter the sky is overhead than at the horizon: 0 even, 2 the overcast of Moon & Spencer 1942. */
  readonly skyGradient: number;
}

type Paint = (a: number, b: number, out: Float64Array) => boolean;

/** A far upright plane Y = const with a painted picture on it. */
interface Backdrop {
  readonly y: number;
  readonly paint: Paint;
}

function put(out: Float64Array, r: number, g: number, b: number, shade: number): void {
  out[0] = r * shade;
  out[1] = g * shade;
  out[2] = b * shade;
}

function farWall(seed: number): Paint {
  const stain = fractalNoise(seed, 4);
  const streak = fractalNoise(seed + 1, 3);
  return (x, z, out) => {
    if (z > 1.9) {
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

function sheds(seed: number): Paint {
  const grime = fractalNoise(seed + 2, 3);
  const buildings = [
    { from: -30, to: -13.5, top: 5.6, rgb: [0.17, 0.065, 0.05] },
    { from: -12.9, to: -4.2, top: 4.3, rgb: [0.2, 0.19, 0.17] },
    { from: 1.5, to: 11.5, top: 6.6, rgb: [0.075, 0.11, 0.12] },
    { from: 12.2, to: 30, top: 4.6, rgb: [0.16, 0.15, 0.13] },
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

function hullSide(middleX: number, lengthM: number): Paint {
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
        put(out, 0.42, 0.4, 0.36, shade);
      } else if (boot) {
        put(out, 0.2, 0.045, 0.035, shade);
      } else {
        put(out, 0.022, 0.055, 0.1, shade);
      }
      return true;
    }
    const cabinTop = 1.75 - 0.1 * (along + 0.2);
    if (along > -0.5 && along < 0.16 - 0.08 * (z - 1) && z < cabinTop && z > 0) {
      const glass = z > 1.2 && z < 1.55 && Math.abs(((along + 0.5) * 5) % 1) > 0.16;
      put(out, glass ? 0.03 : 0.4, glass ? 0.035 : 0.4, glass ? 0.04 : 0.38, 0.9);
      return true;
    }
    return false;
  };
}

/** Nearest positive distance to a capped upright cylinder's side, or Infinity. */
function hitPost(
  post: readonly [number, number, number, number],
  ox: number,
  oy: number,
  oz: number,
  dx: number,
  dy: number,
  dz: number,
): number {
  const [px, py, radius, top] = post;
  const a = dx * dx + dy * dy;
  const b = (ox - px) * dx + (oy - py) * dy;
  const c = (ox - px) ** 2 + (oy - py) ** 2 - radius * radius;
  const inside = b * b - a * c;
  if (inside <= 0) {
    return Number.POSITIVE_INFINITY;
  }
  const side = (-b - Math.sqrt(inside)) / a;
  if (side <= 0) {
    return Number.POSITIVE_INFINITY;
  }
  const z = oz + side * dz;
  if (z <= top) {
    return z >= -0.05 ? side : Number.POSITIVE_INFINITY;
  }
  const cap = (top - oz) / dz;
  const cx = ox + cap * dx - px;
  const cy = oy + cap * dy - py;
  return cap > 0 && cx * cx + cy * cy < radius * radius ? cap : Number.POSITIVE_INFINITY;
}

/** Builds the surroundings; `random` only sets stains and grain. */
export function buildSurroundings(options: SurroundingsOptions, random: Random): Surroundings {
  const seed = Math.floor(random.uniform(0, 2 ** 31));
  const concrete = fractalNoise(seed + 5, 5, 0.55);
  const blotch = fractalNoise(seed + 6, 3);
  const grain = fractalNoise(seed + 7, 3);
  const { quayX, quayTopM, post, boom } = options;
  const backdrops: Backdrop[] = [];
  if (options.hull) {
    backdrops.push({ y: options.hull[1], paint: hullSide(options.hull[0], options.hull[2]) });
  }
  backdrops.push({ y: options.farY, paint: farWall(seed) }, { y: options.farY + 6, paint: sheds(seed) });
  const boomLength = boom ? Math.hypot(boom.to[0] - boom.from[0], boom.to[1] - boom.from[1]) : 0;

  const paintQuay = (x: number, y: number, z: number, onTop: boolean, out: Float64Array) => {
    const across = onTop ? quayX - x : quayTopM - z;
    const fine = 1 + 0.3 * concrete(y * 5, across * 5 + (onTop ? 40 : 0));
    const rough =
      1 + 0.3 * blotch(y * 0.9, across * 0.9 + (onTop ? 9 : 3)) + 0.25 * grain(y * 60, across * 60);
    const joint = Math.abs(y / 2.5 + 0.3 - Math.round(y / 2.5 + 0.3)) < 0.004;
    if (onTop) {
      const coping = across < 0.34;
      const gap = Math.abs(across - 0.34) < 0.012 || joint;
      put(out, 1.03, 1, 0.93, 0.2 * fine * rough * (coping ? 1.2 : 0.85) * (gap ? 0.35 : 1));
      return;
    }
    const wet = smoothStep(0.25, 0.6, z + 0.08 * blotch(y * 2, 1.5));
    const shade = 0.085 * fine * rough * (joint ? 0.4 : 1) * (0.3 + 0.7 * wet) * (0.6 + 0.4 * (z / quayTopM));
    put(out, 1.03 - 0.25 * (1 - wet), 1 + 0.05 * (1 - wet), 0.92 - 0.4 * (1 - wet), shade);
  };

  const traceBoom = (
    ox: number,
    oy: number,
    oz: number,
    dx: number,
    dy: number,
    dz: number,
    out: Float64Array,
  ) => {
    if (!boom || boomLength === 0) {
      return Number.POSITIVE_INFINITY;
    }
    const ax = (boom.to[0] - boom.from[0]) / boomLength;
    const ay = (boom.to[1] - boom.from[1]) / boomLength;
    const radius = 0.13;
    const lift = 0.05;
    // Distance to the boom's axis line decides; the cylinder is cut into floats by shade only.
    const wx = ox - boom.from[0];
    const wy = oy - boom.from[1];
    const wz = oz - lift;
    const da = dx * ax + dy * ay;
    const wa = wx * ax + wy * ay;
    const [px, py, pz] = [dx - da * ax, dy - da * ay, dz];
    const [qx, qy, qz] = [wx - wa * ax, wy - wa * ay, wz];
    const a = px * px + py * py + pz * pz;
    const b = px * qx + py * qy + pz * qz;
    let best = Number.POSITIVE_INFINITY;
    for (const r of [radius, radius * 0.45]) {
      const disc = b * b - a * (qx * qx + qy * qy + qz * qz - r * r);
      if (disc <= 0) {
        continue;
      }
      const t = (-b - Math.sqrt(disc)) / a;
      const along = wa + t * da;
      const z = oz + t * dz;
      if (t <= 0 || along < 0 || along > boomLength || z < 0) {
        continue;
      }
      const cell = along / 1.15 - Math.floor(along / 1.15);
      const float = cell > 0.1;
      if (r === radius && !float) {
        continue;
      }
      if (t < best) {
        best = t;
        const nz = (z - lift) / r;
        const shade = (0.32 + 0.68 * Math.max(0, 0.5 + 0.5 * nz)) * (1 + 0.15 * grain(along * 9, nz * 3));
        const dirty = smoothStep(0.02, 0.1, z);
        put(out, 0.44 * (0.5 + 0.5 * dirty), 0.13 * (0.6 + 0.4 * dirty), 0.025, shade * (float ? 1 : 0.5));
      }
    }
    return best;
  };

  const scratch = new Float64Array(3);
  return {
    isLand: (x) => x < quayX,
    sky(dx, dy, dz, out) {
      const sine = Math.max(0, dz) / Math.hypot(dx, dy, dz);
      const level = (1 + options.skyGradient * sine) / (1 + options.skyGradient * 0.5);
      put(out, 1, 1, 1, level);
    },
    trace(ox, oy, oz, dx, dy, dz, out) {
      let best = Number.POSITIVE_INFINITY;
      const toTop = (quayTopM - oz) / dz;
      if (toTop > 1e-6 && ox + toTop * dx < quayX) {
        best = toTop;
        paintQuay(ox + toTop * dx, oy + toTop * dy, quayTopM, true, out);
      }
      const toFace = (quayX - ox) / dx;
      const faceZ = oz + toFace * dz;
      if (toFace > 1e-6 && toFace < best && ox > quayX && faceZ <= quayTopM && faceZ >= 0) {
        best = toFace;
        paintQuay(quayX, oy + toFace * dy, faceZ, false, out);
      }
      if (post) {
        const t = hitPost(post, ox, oy, oz, dx, dy, dz);
        if (t < best) {
          best = t;
          const x = ox + t * dx - post[0];
          const y = oy + t * dy - post[1];
          const z = oz + t * dz;
          const onCap = z > post[3] - 1e-6;
          const round = Math.atan2(y, x);
          const wood = 1 + 0.4 * grain(round * 7, z * 0.8) + 0.2 * concrete(round * 3, z * 4);
          const wet = smoothStep(0.25, 0.5, z + 0.05 * blotch(round * 2, 2));
          const shade = (onCap ? 1.25 : 0.55 + 0.35 * (x / post[2])) * wood * (0.35 + 0.65 * wet);
          put(out, 0.12, 0.1 + 0.012 * (1 - wet), 0.078, shade);
        }
      }
      const toBoom = traceBoom(ox, oy, oz, dx, dy, dz, scratch);
      if (toBoom < best) {
        best = toBoom;
        out.set(scratch);
      }
      for (const backdrop of backdrops) {
        const t = (backdrop.y - oy) / dy;
        if (t <= 1e-6 || t >= best) {
          continue;
        }
        const z = oz + t * dz;
        if (z >= 0 && backdrop.paint(ox + t * dx, z, scratch)) {
          best = t;
          out.set(scratch);
        }
      }
      return best;
    },
  };
}
