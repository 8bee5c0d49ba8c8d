import type { Random } from '../random.ts';

/** Gentle waves as a sum of plane waves; only their slopes matter here. */
export interface Ripples {
  /**
   * Writes the surface slope dz/dx, dz/dy at a place. Waves shorter than a few `footprintM` are faded out, because a
   * pixel averages them; `damping` 0..1 is what a slick leaves of the short ones.
   */
  readonly slope: (x: number, y: number, footprintM: number, damping: number, out: Float64Array) => void;
}

/**
 * `count` waves from 6 cm to 1.5 m long, their directions spread about `windRad`, of `rmsSlope` in all. Slope variance is
 * shared evenly over the logarithm of the wave length.
 */
export function drawRipples(random: Random, rmsSlope: number, windRad: number, count: number): Ripples {
  const kx = new Float64Array(count);
  const ky = new Float64Array(count);
  const phase = new Float64Array(count);
  const amplitude = rmsSlope * Math.sqrt(2 / Math.max(1, count));
  for (let i = 0; i < count; i++) {
    const lengthM = 0.06 * (1.5 / 0.06) ** ((i + random.next()) / count);
    const angle = windRad + 0.6 * random.normal();
    const k = (2 * Math.PI) / lengthM;
    kx[i] = k * Math.cos(angle);
    ky[i] = k * Math.sin(angle);
    phase[i] = random.uniform(0, 2 * Math.PI);
  }
  return {
    slope(x, y, footprintM, damping, out) {
      let sx = 0;
      let sy = 0;
      for (let i = 0; i < count; i++) {
        const wx = kx[i]!;
        const wy = ky[i]!;
        const k2 = wx * wx + wy * wy;
        const k = Math.sqrt(k2);
        const short = k / (k + 12);
        const size =
          amplitude * Math.exp(-0.08 * k2 * footprintM * footprintM) * (1 - short + short * damping);
        if (size > 1e-5) {
          const s = (size * Math.cos(wx * x + wy * y + phase[i]!)) / k;
          sx += s * wx;
          sy += s * wy;
        }
      }
      out[0] = sx;
      out[1] = sy;
    },
  };
}
