import { scramble32 } from './random.ts';

/** A smooth function of two coordinates; mean about 0. */
export type Field2 = (x: number, y: number) => number;

/** (0, 0) to 0, slope and curvature 0 at both ends (Perlin 2002, "Improving noise"). */
function fade(t: number): number {
  return t * t * t * (t * (t * 6 - 15) + 10);
}

function latticeGradient(seed: number, ix: number, iy: number, x: number, y: number): number {
  const angle =
    (scramble32(seed ^ Math.imul(ix, 0x27d4eb2d) ^ Math.imul(iy, 0x165667b1)) / 4294967296) * 2 * Math.PI;
  return Math.cos(angle) * x + Math.sin(angle) * y;
}

/**
 * Gradient noise with one feature a unit of length, values within about +-0.7 (Perlin 1985, 2002; gradients on the unit
 * circle by a hash of the lattice point).
 */
export function gradientNoise(seed: number): Field2 {
  return (x, y) => {
    const ix = Math.floor(x);
    const iy = Math.floor(y);
    const dx = x - ix;
    const dy = y - iy;
    const u = fade(dx);
    const top =
      latticeGradient(seed, ix, iy, dx, dy) * (1 - u) + latticeGradient(seed, ix + 1, iy, dx - 1, dy) * u;
    const bottom =
      latticeGradient(seed, ix, iy + 1, dx, dy - 1) * (1 - u) +
      latticeGradient(seed, ix + 1, iy + 1, dx - 1, dy - 1) * u;
    const v = fade(dy);
    return top * (1 - v) + bottom * v;
  };
}

/** Sum of `octaves` of gradient noise, each at twice the frequency and `gain` times the size of the one before. */
export function fractalNoise(seed: number, octaves: number, gain = 0.5): Field2 {
  const layers = Array.from({ length: octaves }, (_, i) => gradientNoise(scramble32(seed + 101 * (i + 1))));
  return (x, y) => {
    let sum = 0;
    let size = 1;
    let scale = 1;
    for (const layer of layers) {
      sum += size * layer(x * scale + 17.3 * size, y * scale - 9.1 * size);
      size *= gain;
      scale *= 2;
    }
    return sum;
  };
}

/** 0 below `low`, 1 above `high`, smooth between. */
export function smoothStep(low: number, high: number, value: number): number {
  const t = Math.min(1, Math.max(0, (value - low) / (high - low)));
  return t * t * (3 - 2 * t);
}
