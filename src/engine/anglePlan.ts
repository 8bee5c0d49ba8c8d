import { reflectanceTable } from '../optics/reflectanceTable.ts';
import type { FilmStack } from '../optics/types.ts';
import type { PoseDraw } from '../view/poseDraws.ts';
import { LIMIT_RAD } from '../view/viewLimits.ts';
import { cosineReader, groundAreaAtM2 } from '../view/waterFields.ts';
import { incidenceAtRad, type WaterView } from '../view/waterView.ts';
import { SetupError } from './prepareScene.ts';

/** At which angles the charts of a slanted photo are drawn and its camera is fitted. */
export interface AnglePlan {
  readonly view: WaterView;
  readonly cosineAt: (x: number, y: number) => number;
  /** Median over the pixels that take part, radians. */
  readonly referenceRad: number;
  /** Ascending; the first and last are those of the nearest and farthest pixel. */
  readonly chartRad: Float64Array;
  /** Middles of the strips whose film colours the camera is fitted to. */
  readonly fitRad: Float64Array;
  /** Film is sampled for the fit down to this cosine. */
  readonly fitLeastCosine: number;
  /** Mean reflectance of the film over its colours, by angle: how bright a strip is. */
  readonly brightness: (incidenceRad: number) => number;
  /** A pixel that looks at about this angle. */
  readonly pixelAt: (incidenceRad: number) => readonly [number, number];
}

const DEGREE = Math.PI / 180;
/** Grid on which angles are counted. */
const COUNTED = 40_000;
/** Farthest apart two chart angles may be, and how much brighter the next may be (logarithm): linear in between. */
const CHART_SPACING = { rad: 4 * DEGREE, brighter: 0.1 } as const;
/** The same for the strips of the fit, whose colours are brought to the middle of their strip. */
const FIT_SPACING = { rad: 6 * DEGREE, brighter: 0.2 } as const;
const MOST_STRIPS = 8;
/** Beyond this angle the film's contrast is weak and far things mirror in it: left out of the fit where there is more. */
const FIT_LIMIT_RAD = 66 * DEGREE;
/** Share of the pixels that must be left for the fit for that limit to hold. */
const FIT_SHARE = 0.25;

/**
 * Looks at which angles the pixels that take part are seen.
 * @param leftOut one byte a pixel, 0 takes part; null for all
 * @throws SetupError where none of them is seen within 75 degrees of the vertical
 */
export function planAngles(view: WaterView, stack: FilmStack, leftOut: Uint8Array | null): AnglePlan {
  const { widthPx, heightPx } = view.camera;
  const cosineAt = cosineReader(view);
  const least = Math.cos(LIMIT_RAD);
  const spacing = Math.max(1, Math.floor(Math.sqrt((widthPx * heightPx) / COUNTED)));
  const seen: { cosine: number; x: number; y: number }[] = [];
  for (let y = spacing >> 1; y < heightPx; y += spacing) {
    for (let x = spacing >> 1; x < widthPx; x += spacing) {
      if (leftOut?.[y * widthPx + x]) continue;
      const cosine = cosineAt(x, y);
      if (cosine >= least) seen.push({ cosine, x, y });
    }
  }
  if (seen.length === 0) {
    throw new SetupError(
      'No water is seen within 75° of the vertical: check the horizon, the tilt and the region, or take a photo that looks further down.',
    );
  }
  seen.sort((a, b) => b.cosine - a.cosine);
  const angle = (k: number) => Math.acos(Math.min(1, seen[Math.min(seen.length - 1, k)]!.cosine));
  const from = angle(0);
  const to = angle(seen.length - 1);
  const brightness = brightnessOf(stack);
  const within = seen.filter(({ cosine }) => cosine >= Math.cos(FIT_LIMIT_RAD)).length;
  const limited = within >= FIT_SHARE * seen.length && within > 0;
  const fitTo = limited ? Math.min(to, FIT_LIMIT_RAD) : to;
  return {
    view,
    cosineAt,
    referenceRad: angle(seen.length >> 1),
    chartRad: spread(from, to, CHART_SPACING, brightness, 'ends', 200),
    fitRad: spread(from, fitTo, FIT_SPACING, brightness, 'middles', MOST_STRIPS),
    fitLeastCosine: Math.cos(fitTo + 1e-6),
    brightness,
    pixelAt: (incidenceRad) => {
      const cosine = Math.cos(incidenceRad);
      let low = 0;
      let high = seen.length - 1;
      while (low < high) {
        const middle = (low + high) >> 1;
        if (seen[middle]!.cosine > cosine) low = middle + 1;
        else high = middle;
      }
      return [seen[low]!.x, seen[low]!.y];
    },
  };
}

/** Angles so spread that neither the angle nor the brightness changes much from one to the next. */
function spread(
  from: number,
  to: number,
  most: { readonly rad: number; readonly brighter: number },
  brightness: (rad: number) => number,
  place: 'ends' | 'middles',
  limit: number,
): Float64Array {
  const parts = 400;
  const at = (k: number) => from + ((to - from) * k) / parts;
  const way = new Float64Array(parts + 1);
  for (let k = 1; k <= parts; k++) {
    const brighter = Math.abs(Math.log(brightness(at(k)) / brightness(at(k - 1))));
    way[k] = way[k - 1]! + Math.max((at(k) - at(k - 1)) / most.rad, brighter / most.brighter);
  }
  const steps = Math.min(limit, Math.max(1, Math.ceil(way[parts]! - 1e-9)));
  if (!(way[parts]! > 0)) return Float64Array.of(from);
  const count = place === 'ends' ? steps + 1 : steps;
  return Float64Array.from({ length: count }, (_, n) => {
    const goal = (way[parts]! * (place === 'ends' ? n : n + 0.5)) / steps;
    let k = 1;
    while (k < parts && way[k]! < goal) k++;
    const part = (goal - way[k - 1]!) / (way[k]! - way[k - 1]!);
    return at(k - 1 + Math.max(0, Math.min(1, part)));
  });
}

/** Mean reflectance at 550 nm over thicknesses of three orders. */
function brightnessOf(stack: FilmStack): (incidenceRad: number) => number {
  const thicknessNm = Float64Array.from({ length: 61 }, (_, j) => 10 * j);
  const byDegree = Float64Array.from({ length: 86 }, (_, degree) => {
    const table = reflectanceTable(stack, {
      thicknessNm,
      wavelengthNm: Float64Array.of(550),
      incidenceRad: degree * DEGREE,
      polarisation: 'unpolarised',
    });
    return table.reduce((sum, v) => sum + v, 0) / table.length;
  });
  return (incidenceRad) => {
    const place = Math.max(0, Math.min(84.999, incidenceRad / DEGREE));
    const below = Math.floor(place);
    return byDegree[below]! + (place - below) * (byDegree[below + 1]! - byDegree[below]!);
  };
}

/** Width of a pixel on the water about an angle, metres (root of its area). */
export function pixelOnWaterM(plan: AnglePlan, incidenceRad: number): number {
  const [x, y] = plan.pixelAt(incidenceRad);
  return Math.sqrt(groundAreaAtM2(plan.view, x + 0.5, y + 0.5));
}

/**
 * One standard deviation of the incidence at an angle of the photo, radians: what is not sure of the view, each cause by
 * a step of its own (JCGM 100:2008, 5.1.3), added as squares.
 */
export function incidenceSdRad(plan: AnglePlan, poses: PoseDraw, incidenceRad: number): number {
  const [x, y] = plan.pixelAt(incidenceRad);
  const inputs = drawWith(poses, -1).asked;
  const nominal = incidenceAtRad(drawWith(poses, -1).view, x + 0.5, y + 0.5);
  let variance = 0;
  for (let k = 0; k < inputs; k++) {
    variance += (incidenceAtRad(drawWith(poses, k).view, x + 0.5, y + 0.5) - nominal) ** 2;
  }
  return Math.sqrt(variance);
}

/** The view with its input number `moved` one standard deviation off, all others as they are. */
function drawWith(poses: PoseDraw, moved: number): { readonly view: WaterView; readonly asked: number } {
  let asked = 0;
  const view = poses({ normal: () => (asked++ === moved ? 1 : 0) });
  return { view, asked };
}
