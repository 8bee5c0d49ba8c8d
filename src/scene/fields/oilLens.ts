import { hashText, type Random } from '../random.ts';
import { fractalNoise } from '../smoothNoise.ts';
import type { ThicknessField } from './thicknessField.ts';

export interface OilLensOptions {
  /** Thickness just inside the edge and in the middle, nm: the edge is a step. */
  readonly edgeNm: number;
  readonly middleNm: number;
  /** Centre and half axes of the large lens on the unit square. */
  readonly centre: readonly [number, number];
  readonly halfAxes: readonly [number, number];
  /** Small lenses around it. */
  readonly satellites: number;
}

export function drawOilLens(random: Random): OilLensOptions {
  return {
    edgeNm: random.uniform(120, 400),
    middleNm: random.uniform(650, 1000),
    centre: [random.uniform(0.5, 0.62), random.uniform(0.44, 0.54)],
    halfAxes: [random.uniform(0.22, 0.3), random.uniform(0.26, 0.36)],
    satellites: 3,
  };
}

/** Lenses of oil that end in a step on bare water (0 outside). */
export function oilLensField(options: OilLensOptions, random: Random): ThicknessField {
  const seed = hashText(String(random.next()));
  const outline = fractalNoise(seed, 3);
  const surface = fractalNoise(seed + 3, 3);
  const lenses = [
    { x: options.centre[0], y: options.centre[1], a: options.halfAxes[0], b: options.halfAxes[1], share: 1 },
  ];
  for (let i = 0; i < options.satellites; i++) {
    const radius = random.uniform(0.035, 0.07);
    lenses.push({
      x: random.uniform(0.3, 0.95),
      y: random.uniform(0.08, 0.95),
      a: radius,
      b: radius,
      share: random.uniform(0.3, 0.8),
    });
  }
  return (x, y) => {
    for (const lens of lenses) {
      const dx = (x - lens.x) / lens.a;
      const dy = (y - lens.y) / lens.b;
      const radius = Math.hypot(dx, dy);
      if (radius > 1.4) {
        continue;
      }
      const edge = 1 + 0.18 * outline(dx / (radius + 0.3) + lens.x * 9, dy / (radius + 0.3) + lens.y * 9);
      const rho = radius / edge;
      if (rho < 1) {
        const dome = (1 - rho * rho) ** 0.8;
        const middle = options.edgeNm + (options.middleNm - options.edgeNm) * lens.share;
        const nm = options.edgeNm + (middle - options.edgeNm) * dome;
        return Math.min(1000, Math.max(1, nm * (1 + 0.07 * dome * surface(x * 5, y * 5))));
      }
    }
    return 0;
  };
}
