import { orderBoundaries } from '../chart/orders.ts';
import type { ActivityMap } from '../match/activity.ts';
import { type AngleCharts, angleCursor } from '../match/angleCharts.ts';
import type { CodeChart } from '../match/codeChart.ts';
import type { FilmBasis, FilmScene } from '../match/filmBasis.ts';
import { makeAngleReader, makePixelReader, type PixelReader } from '../match/pixelReader.ts';
import { cosineReader } from '../view/waterFields.ts';
import type { WaterView } from '../view/waterView.ts';
import type { AnglePlan } from './anglePlan.ts';
import type { RowPixels } from './jobs.ts';
import type { References } from './references.ts';
import { resolvableRange } from './resolvable.ts';
import type { Setup } from './setup.ts';
import type { SlantedOptics } from './slantedOptics.ts';

/** Charts at all angles of a photo, and where its pixels look. Data only: it can go to a worker. */
export interface SeenAngles {
  readonly charts: AngleCharts;
  readonly view: WaterView;
  /** Angle whose order boundaries the calibration lists. */
  readonly referenceRad: number;
}

/** What holds at one pixel: its charts, how thickness there follows from thickness on them, and where orders end. */
export interface SeenAt {
  readonly charts: readonly CodeChart[];
  readonly scale: number;
  readonly orderBoundariesNm: readonly number[];
}

/** What holds at pixels of a photo; call the answer for each pixel. */
export function seenAt(calibration: {
  readonly charts: readonly CodeChart[];
  readonly angles: SeenAngles | null;
  readonly orderBoundariesNm: readonly number[];
}): (x: number, y: number) => SeenAt {
  const { charts, angles, orderBoundariesNm } = calibration;
  if (!angles) return () => ({ charts, scale: 1, orderBoundariesNm });
  const cosineAt = cosineReader(angles.view);
  const cursor = angleCursor(angles.charts, cosineAt);
  const { filmIndex, ambientIndex } = angles.charts;
  const root = (cosine: number) => Math.sqrt(filmIndex ** 2 - ambientIndex ** 2 * (1 - cosine ** 2));
  const reference = root(Math.cos(angles.referenceRad));
  return (x, y) => {
    cursor.moveTo(x, y);
    const ratio = reference / root(Math.max(0, cosineAt(x, y)));
    return {
      charts: angles.charts.charts[cursor.near]!,
      scale: cursor.scale,
      orderBoundariesNm: orderBoundariesNm.map((d) => d * ratio),
    };
  };
}

/** Wavelength at which phase is counted, nm. */
const PATH_WAVELENGTH_NM = 550;

/** A reader of these pixels, at one angle or at each pixel's own. @param firstRow the photo's row of their row 0 */
export function makeReader(
  pixels: RowPixels,
  activity: ActivityMap,
  { charts, angles }: { readonly charts: readonly CodeChart[]; readonly angles: SeenAngles | null },
  firstRow = 0,
): PixelReader {
  return angles
    ? makeAngleReader(pixels, activity, angles.charts, cosineReader(angles.view, firstRow))
    : makePixelReader(pixels, activity, charts);
}

/** Draws the charts at every `every`-th angle of the plan, first and last included. */
export function angleCharts(
  optics: SlantedOptics,
  every: number,
  maxNm: number,
  draw: (
    basis: FilmBasis,
    scene: FilmScene,
    sd: { readonly relative: number; readonly brightness: number },
    nominalOrdersNm: readonly number[],
  ) => readonly CodeChart[],
): AngleCharts {
  const all = optics.plan.chartRad;
  const incidenceRad = all.filter((_, k) => k % every === 0 || k === all.length - 1);
  const { stack } = optics.sceneAt(optics.plan.referenceRad);
  const charts = Array.from(incidenceRad, (angle) =>
    draw(
      optics.basisAt(angle),
      optics.sceneAt(angle),
      { relative: optics.relativeSdAt(angle), brightness: optics.brightnessSdAt(angle) },
      orderBoundaries(stack, angle, maxNm),
    ),
  );
  return {
    incidenceRad,
    charts,
    resolvableNm: Float64Array.from(charts, ([calm]) => {
      const { toNm } = resolvableRange(calm!);
      return toNm >= calm!.thicknessNm[calm!.count - 1]! - 2 ? Number.POSITIVE_INFINITY : toNm;
    }),
    filmIndex: stack.film.refractiveIndex(PATH_WAVELENGTH_NM),
    ambientIndex: stack.ambient.refractiveIndex(PATH_WAVELENGTH_NM),
  };
}

/** Place of the angle nearest to one. */
export function nearestOf(incidenceRad: Float64Array, angle: number): number {
  let best = 0;
  incidenceRad.forEach((own, k) => {
    if (Math.abs(own - angle) < Math.abs(incidenceRad[best]! - angle)) best = k;
  });
  return best;
}

/** Incidence at the middle of the marked bare surface, radians; null where none is marked. */
export function cleanAngle(plan: AnglePlan, setup: Setup): number | null {
  const clean = setup.references?.clean;
  if (!clean) return null;
  const [x, y, width, height] = clean;
  const cosine = plan.cosineAt(x + width / 2 - 0.5, y + height / 2 - 0.5);
  return Math.acos(Math.max(Math.cos(MOST_CLEAN_RAD), Math.min(1, cosine)));
}

/** Bare surface marked at or above the horizon counts as seen at this angle. */
const MOST_CLEAN_RAD = (80 * Math.PI) / 180;

/** The references, with bare surface compared with its own row of a fit over several angles. */
export function withBareRow(references: References, row: number): References {
  const evidence = references.evidence.map((one) => (one.kind === 'clean' ? { ...one, row } : one));
  return { ...references, evidence };
}

/** Pixels that may be sampled for the fit, one byte each; null for all. */
export function usableFor(
  leftOut: Uint8Array | null,
  plan: AnglePlan | null,
  width: number,
): Uint8Array | null {
  if (!leftOut) return null;
  if (!plan) return leftOut.map((mark) => (mark === 0 ? 1 : 0));
  return leftOut.map((mark, i) =>
    mark === 0 && plan.cosineAt(i % width, Math.floor(i / width)) >= plan.fitLeastCosine ? 1 : 0,
  );
}
