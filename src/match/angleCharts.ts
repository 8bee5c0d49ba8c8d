import type { CodeChart } from './codeChart.ts';

/** Cosine of the incidence at the middle of pixel (x, y); below 0 above the horizon. Must cost little. */
export type CosineAt = (x: number, y: number) => number;

/** The chart of one photo at several angles of incidence. Data only. */
export interface AngleCharts {
  /** Ascending, radians. */
  readonly incidenceRad: Float64Array;
  /** For each angle, one chart for each activity class. */
  readonly charts: readonly (readonly CodeChart[])[];
  /** Past this thickness colour tells nothing more, for each angle. */
  readonly resolvableNm: Float64Array;
  /** Under this thickness film cannot be told from bare surface, for each angle; absent where one limit serves all. */
  readonly bareNm?: Float64Array;
  /** Of the film and of what light comes through to it: a colour fixes thickness times sqrt(n^2 - (n0 sin i)^2). */
  readonly filmIndex: number;
  readonly ambientIndex: number;
}

/** Where among the angles one pixel lies. */
export interface AngleCursor {
  readonly moveTo: (x: number, y: number) => void;
  /** Nearest angle, and the one on the other side of the pixel's own. */
  near: number;
  beside: number;
  /** Share that the other one has in the pixel's reading, 0 to a half. */
  share: number;
  /** Thickness at the pixel for thickness on the chart of either angle: a colour fixes the phase. */
  scale: number;
  scaleBeside: number;
}

/** Places of the table from cosine to angle. */
const TABLE = 4096;

/**
 * Makes a cursor. Between two angles a pixel's share goes by the cosine, which saves an arc cosine a pixel; outside the
 * angles the last chart serves alone.
 */
export function angleCursor(
  at: Pick<AngleCharts, 'incidenceRad' | 'filmIndex' | 'ambientIndex'>,
  cosineAt: CosineAt,
): AngleCursor {
  const { incidenceRad, filmIndex, ambientIndex } = at;
  const count = incidenceRad.length;
  const cosines = incidenceRad.map((angle) => Math.cos(angle));
  const film2 = filmIndex * filmIndex;
  const ambient2 = ambientIndex * ambientIndex;
  const roots = cosines.map((cosine) => Math.sqrt(film2 - ambient2 * (1 - cosine * cosine)));
  // Angle at or before each cosine, counted from the vertical.
  const below = new Uint8Array(TABLE + 1);
  for (let i = 0; i <= TABLE; i++) {
    let k = 0;
    while (k + 1 < count && cosines[k + 1]! >= i / TABLE) k++;
    below[i] = k;
  }
  const cursor: AngleCursor = {
    near: 0,
    beside: 0,
    share: 0,
    scale: 1,
    scaleBeside: 1,
    moveTo: (x, y) => {
      const cosine = Math.max(0, cosineAt(x, y));
      let k = below[Math.min(TABLE, Math.ceil(cosine * TABLE))]!;
      while (k + 1 < count && cosines[k + 1]! >= cosine) k++;
      const root = Math.sqrt(film2 - ambient2 * (1 - cosine * cosine));
      let share = k + 1 < count ? (cosines[k]! - cosine) / (cosines[k]! - cosines[k + 1]!) : 0;
      let other = Math.min(k + 1, count - 1);
      if (share < 0) share = 0;
      if (share > 0.5) {
        share = 1 - share;
        other = k;
        k++;
      }
      cursor.near = k;
      cursor.beside = other;
      cursor.share = share;
      cursor.scale = roots[k]! / root;
      cursor.scaleBeside = roots[other]! / root;
    },
  };
  return cursor;
}
