import type { Random } from '../random.ts';
import { fractalNoise, smoothStep } from '../smoothNoise.ts';
import { type Backdrop, farShore, farWall, hullSide, put, sheds } from './backdrops.ts';

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
  /** Far quay wall at this Y, ending at this X: beyond it lies open water. */
  readonly farY: number;
  readonly farWallToX: number;
  /** Upright round posts: piles in the water, bollards on the quay. */
  readonly posts: readonly Post[];
  /** Floating boom from one place to another on the water. Null for none. */
  readonly boom: { readonly from: readonly [number, number]; readonly to: readonly [number, number] } | null;
  /** Moored hull: X of its middle, Y, length. Null for none. */
  readonly hull: readonly [number, number, number] | null;
  /** How much brighter the sky is overhead than at the horizon: 0 even, 2 the overcast of Moon & Spencer 1942. */
  readonly skyGradient: number;
  /** Contrast of the clouds' texture, 0 for none. */
  readonly cloud: number;
}

export interface Post {
  readonly x: number;
  readonly y: number;
  readonly radiusM: number;
  readonly footM: number;
  readonly topM: number;
  readonly made: 'wood' | 'iron';
}

/** Nearest positive distance to a post's side or cap, or Infinity. */
function hitPost(post: Post, ox: number, oy: number, oz: number, dx: number, dy: number, dz: number): number {
  const wx = ox - post.x;
  const wy = oy - post.y;
  const a = dx * dx + dy * dy;
  const b = wx * dx + wy * dy;
  const inside = b * b - a * (wx * wx + wy * wy - post.radiusM * post.radiusM);
  const side = (-b - Math.sqrt(inside)) / a;
  if (!(inside > 0 && side > 0)) {
    return Number.POSITIVE_INFINITY;
  }
  const z = oz + side * dz;
  if (z <= post.topM) {
    return z >= post.footM ? side : Number.POSITIVE_INFINITY;
  }
  const cap = (post.topM - oz) / dz;
  const cx = wx + cap * dx;
  const cy = wy + cap * dy;
  return cap > 0 && cx * cx + cy * cy < post.radiusM * post.radiusM ? cap : Number.POSITIVE_INFINITY;
}

/** Builds the surroundings; `random` only sets stains and grain. */
export function buildSurroundings(options: SurroundingsOptions, random: Random): Surroundings {
  const seed = Math.floor(random.uniform(0, 2 ** 31));
  const concrete = fractalNoise(seed + 5, 5, 0.55);
  const blotch = fractalNoise(seed + 6, 3);
  const grain = fractalNoise(seed + 7, 3);
  const clouds = fractalNoise(seed + 8, 4);
  const { quayX, quayTopM, boom } = options;
  const backdrops: Backdrop[] = [];
  if (options.hull) {
    backdrops.push({ y: options.hull[1], paint: hullSide(options.hull[0], options.hull[2]) });
  }
  backdrops.push(
    { y: options.farY, paint: farWall(seed, options.farWallToX) },
    { y: options.farY + 6, paint: sheds(seed) },
    { y: 2500, paint: farShore(seed) },
  );
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
      put(out, 1.03, 1, 0.93, 0.115 * fine * rough * (coping ? 1.2 : 0.85) * (gap ? 0.35 : 1));
      return;
    }
    const wet = smoothStep(0.25, 0.6, z + 0.08 * blotch(y * 2, 1.5));
    const shade = 0.06 * fine * rough * (joint ? 0.4 : 1) * (0.3 + 0.7 * wet) * (0.6 + 0.4 * (z / quayTopM));
    put(out, 1.03 - 0.25 * (1 - wet), 1 + 0.05 * (1 - wet), 0.92 - 0.4 * (1 - wet), shade);
  };

  const paintPost = (post: Post, x: number, y: number, z: number, out: Float64Array) => {
    const onCap = z > post.topM - 1e-6;
    const round = Math.atan2(y, x);
    const lit = onCap ? 1.25 : 0.6 + 0.35 * (x / post.radiusM);
    if (post.made === 'iron') {
      put(out, 0.034, 0.03, 0.027, lit * (1 + 0.5 * concrete(round * 2, z * 9)));
      return;
    }
    const wood = 1 + 0.4 * grain(round * 7, z * 0.8) + 0.2 * concrete(round * 3, z * 4);
    const wet = smoothStep(0.25, 0.5, z + 0.05 * blotch(round * 2, 2));
    put(out, 0.085, 0.07 + 0.01 * (1 - wet), 0.053, lit * wood * (0.35 + 0.65 * wet));
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
        put(out, 0.26 * (0.5 + 0.5 * dirty), 0.085 * (0.6 + 0.4 * dirty), 0.025, shade * (float ? 1 : 0.5));
      }
    }
    return best;
  };

  const scratch = new Float64Array(3);
  return {
    isLand: (x) => x < quayX,
    sky(dx, dy, dz, out) {
      const sine = Math.max(0, dz) / Math.hypot(dx, dy, dz);
      const cloud = 1 + options.cloud * clouds((2.2 * dx) / (dz + 0.35), (2.2 * dy) / (dz + 0.35));
      const level = (cloud * (1 + options.skyGradient * sine)) / (1 + options.skyGradient * 0.5);
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
      for (const post of options.posts) {
        const t = hitPost(post, ox, oy, oz, dx, dy, dz);
        if (t < best) {
          best = t;
          paintPost(post, ox + t * dx - post.x, oy + t * dy - post.y, oz + t * dz, out);
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
