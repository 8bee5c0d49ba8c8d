import type { ThicknessField } from '../fields/thicknessField.ts';
import type { FilmTable } from '../filmTable.ts';
import { incidenceRad, lookAlong, type PinholeView, viewAxes, waterAreaM2 } from '../perspective.ts';
import { TRUE_KIND } from '../types.ts';
import type { Ripples } from './ripples.ts';
import type { Surroundings } from './solids.ts';

/** A spot that is neither water nor film, lying on the water: foam (white) or debris (brown). Metres. */
export interface Spot {
  readonly x: number;
  readonly y: number;
  readonly radiusM: number;
  readonly raw: readonly [number, number, number];
}

export interface HarbourView {
  readonly view: PinholeView;
  /** Oil thickness over the water plane, metres; 0 where bare. */
  readonly field: ThicknessField;
  readonly table: FilmTable;
  readonly surroundings: Surroundings;
  readonly ripples: Ripples;
  readonly spots: readonly Spot[];
  /** Light coming up out of the water, relative to the sky, in raw values. */
  readonly waterLight: readonly [number, number, number];
  /** Bright patch of the sky: direction (unit) and the cosine of its half width; null for an even sky. */
  readonly sun: { readonly direction: readonly [number, number, number]; readonly cosine: number } | null;
  /** Rays a pixel along each side. */
  readonly subsamples: number;
}

/** Raw camera values and truth for each pixel, row by row from the top left. */
export interface RenderedWater {
  readonly raw: Float32Array;
  /** Mean over the water in the pixel; NaN where there is none. */
  readonly thicknessNm: Float32Array;
  readonly kind: Uint8Array;
  /** Water area in the pixel, and its oiled part, square metres; 0 off the water. */
  readonly areaM2: Float64Array;
  readonly oiledM2: Float64Array;
  /** Sum of thickness times area, nm m2. */
  readonly volumeNmM2: Float64Array;
}

/** Distance beyond which the water mirrors no shapes. */
const SMEARED_M = 150;

/** Renders the view. Cost: subsamples^2 rays a pixel, one more for each that meets water. */
export function renderHarbour(scene: HarbourView): RenderedWater {
  const { view, subsamples, surroundings, table, ripples } = scene;
  const { widthPx: width, heightPx: height } = view;
  const pixels = width * height;
  const out: RenderedWater = {
    raw: new Float32Array(3 * pixels),
    thicknessNm: new Float32Array(pixels).fill(Number.NaN),
    kind: new Uint8Array(pixels),
    areaM2: new Float64Array(pixels),
    oiledM2: new Float64Array(pixels),
    volumeNmM2: new Float64Array(pixels),
  };
  const axes = viewAxes(view);
  const ray = new Float64Array(3);
  const colour = new Float64Array(3);
  const mirror = new Float64Array(3);
  const film = new Float64Array(3);
  const slope = new Float64Array(2);
  const share = 1 / (subsamples * subsamples);

  for (let row = 0; row < height; row++) {
    for (let column = 0; column < width; column++) {
      const pixel = row * width + column;
      let water = 0;
      let oiled = 0;
      let disturbed = 0;
      let mirrored = 0;
      let thickness = 0;
      for (let sy = 0; sy < subsamples; sy++) {
        for (let sx = 0; sx < subsamples; sx++) {
          lookAlong(view, axes, column + (sx + 0.5) / subsamples, row + (sy + 0.5) / subsamples, ray);
          const [dx, dy, dz] = [ray[0]!, ray[1]!, ray[2]!];
          const toSolid = surroundings.trace(0, 0, view.heightM, dx, dy, dz, colour);
          const toWater = dz < 0 ? -view.heightM / dz : Number.POSITIVE_INFINITY;
          if (toSolid < toWater) {
            addRaw(out.raw, pixel, colour, share);
            continue;
          }
          if (toWater === Number.POSITIVE_INFINITY) {
            surroundings.sky(dx, dy, dz, colour);
            addRaw(out.raw, pixel, colour, share);
            continue;
          }
          const x = toWater * dx;
          const y = toWater * dy;
          const areaM2 = waterAreaM2(view, ray) * share;
          const nm = scene.field(x, y);
          water++;
          out.areaM2[pixel]! += areaM2;
          if (nm > 0) {
            oiled++;
            thickness += nm;
            out.oiledM2[pixel]! += areaM2;
            out.volumeNmM2[pixel]! += nm * areaM2;
          }
          const spot = spotAt(scene.spots, x, y);
          if (spot) {
            disturbed++;
            colour.set(spot.raw);
            addRaw(out.raw, pixel, colour, share);
            continue;
          }
          // Slope of the ripples turns both the angle of incidence and the mirrored place.
          ripples.slope(x, y, Math.sqrt(waterAreaM2(view, ray)), nm > 0 ? 0.5 : 1, slope);
          const length = Math.hypot(dx, dy, dz);
          const norm = 1 / Math.hypot(slope[0]!, slope[1]!, 1);
          const [nx, ny, nz] = [-slope[0]! * norm, -slope[1]! * norm, norm];
          const along = Math.min(-1e-3, (dx * nx + dy * ny + dz * nz) / length);
          const rx = dx / length - 2 * along * nx;
          const ry = dy / length - 2 * along * ny;
          const rz = Math.max(1e-3, dz / length - 2 * along * nz);
          // Far out the waves inside one pixel smear whatever stands there: the water shows sky alone.
          const far = x * x + y * y > SMEARED_M * SMEARED_M;
          if (far || surroundings.trace(x, y, 1e-4, rx, ry, rz, mirror) === Number.POSITIVE_INFINITY) {
            surroundings.sky(rx, ry, rz, mirror);
          } else {
            mirrored++;
          }
          table.lookUp(nm, Math.acos(-along), film);
          for (let c = 0; c < 3; c++) {
            colour[c] = film[c]! * mirror[c]! + scene.waterLight[c]!;
          }
          if (scene.sun) {
            const [ux, uy, uz] = scene.sun.direction;
            if (rx * ux + ry * uy + rz * uz > scene.sun.cosine) {
              disturbed++;
              for (let c = 0; c < 3; c++) {
                colour[c]! += 60 * film[c]!;
              }
            }
          }
          addRaw(out.raw, pixel, colour, share);
        }
      }
      if (water > 0) {
        out.thicknessNm[pixel] = thickness / water;
      }
      const all = subsamples * subsamples;
      out.kind[pixel] =
        water < all || disturbed > 0
          ? TRUE_KIND.other
          : mirrored > 0
            ? TRUE_KIND.mirrorsSolid
            : 2 * oiled >= all
              ? TRUE_KIND.film
              : TRUE_KIND.bare;
      if (out.kind[pixel] === TRUE_KIND.bare) {
        out.thicknessNm[pixel] = 0;
      }
    }
  }
  return out;
}

function addRaw(raw: Float32Array, pixel: number, colour: Float64Array, share: number): void {
  raw[3 * pixel]! += colour[0]! * share;
  raw[3 * pixel + 1]! += colour[1]! * share;
  raw[3 * pixel + 2]! += colour[2]! * share;
}

function spotAt(spots: readonly Spot[], x: number, y: number): Spot | undefined {
  return spots.find((spot) => {
    const dx = x - spot.x;
    const dy = y - spot.y;
    return dx * dx + dy * dy < spot.radiusM * spot.radiusM;
  });
}

/** Incidence on level water at a pixel's middle, degrees. */
export function incidenceAtDeg(view: PinholeView, x: number, y: number): number {
  const ray = [0, 0, 0];
  lookAlong(view, viewAxes(view), x, y, ray);
  return (incidenceRad(ray) * 180) / Math.PI;
}
