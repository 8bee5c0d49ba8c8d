import { hashText, type Random } from '../random.ts';
import { fractalNoise, smoothStep } from '../smoothNoise.ts';
import type { ThicknessField } from './thicknessField.ts';

export interface OilSheenOptions {
  /** Greatest thickness, nm. */
  readonly thickestNm: number;
  /** Share of the box that is bare water. */
  readonly bareShare: number;
  /** Features a unit of length. */
  readonly scale: number;
  /** Stretch along x: 1 for patches, 3 and more for streamers. */
  readonly stretch: number;
  /** Holes of bare water a unit of area. */
  readonly holes: number;
  /** A place kept free of oil, for the clean reference; [x, y, radius]. */
  readonly keepBare: readonly [number, number, number];
  /** The box over which `thickestNm` is reached; [x0, y0, x1, y1]. */
  readonly box: readonly [number, number, number, number];
}

export function drawOilSheen(random: Random): OilSheenOptions {
  return {
    thickestNm: random.uniform(650, 1000),
    bareShare: random.uniform(0.4, 0.65),
    scale: random.uniform(1.3, 2.1),
    stretch: random.uniform(1, 2.2),
    holes: 8,
    keepBare: [0.1, 0.88, 0.16],
    box: [0, 0, 1, 1],
  };
}

/** A sheen with islands, holes and bare water between (0 there); smooth inside, its edges thin out steeply. */
export function oilSheenField(options: OilSheenOptions, random: Random): ThicknessField {
  const seed = hashText(String(random.next()));
  const body = fractalNoise(seed, 3, 0.38);
  const warpX = fractalNoise(seed + 1, 2);
  const warpY = fractalNoise(seed + 2, 2);
  const [x0, y0, x1, y1] = options.box;
  const area = (x1 - x0) * (y1 - y0);
  const holes = Array.from({ length: Math.round(options.holes * area) }, () => ({
    x: random.uniform(x0, x1),
    y: random.uniform(y0, y1),
    radius: random.uniform(0.03, 0.07) * (1.7 / options.scale),
  }));
  const [bareX, bareY, bareRadius] = options.keepBare;

  const level: ThicknessField = (x, y) => {
    const u = (x * options.scale) / options.stretch;
    const v = y * options.scale;
    let value = body(u + 0.7 * warpX(u * 0.8, v * 0.8), v + 0.7 * warpY(u * 0.8 + 5, v * 0.8));
    for (const hole of holes) {
      const dx = (x - hole.x) / options.stretch / hole.radius;
      const dy = (y - hole.y) / hole.radius;
      const distance = Math.hypot(dx, dy);
      if (distance < 2.4) {
        const ragged = distance * (1 + 0.35 * warpX(dx + 40 * hole.x, dy + 40 * hole.y));
        value -= 0.7 * (1 - smoothStep(0.5, 1.8, ragged));
      }
    }
    const toBare = Math.hypot(x - bareX, y - bareY) / bareRadius;
    if (toBare > 3) {
      return value;
    }
    // Ragged outside, but surely bare within the radius.
    const ragged = toBare * (1 + 0.6 * smoothStep(1, 1.3, toBare) * warpX(3 * u + 7, 3 * v - 4));
    return value - 2 * (1 - smoothStep(1, 1.9, ragged));
  };

  const levels = new Float64Array(96 * 96);
  for (let j = 0; j < 96; j++) {
    for (let i = 0; i < 96; i++) {
      levels[96 * j + i] = level(x0 + ((x1 - x0) * (i + 0.5)) / 96, y0 + ((y1 - y0) * (j + 0.5)) / 96);
    }
  }
  levels.sort();
  const waterline = levels[Math.floor(options.bareShare * (levels.length - 1))]!;
  const span = levels[levels.length - 1]! - waterline;
  return (x, y) => {
    const share = Math.min(1, (level(x, y) - waterline) / span);
    return share <= 0 ? 0 : options.thickestNm * share ** 0.9;
  };
}
