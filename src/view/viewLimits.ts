import type { Notice } from './notice.ts';

const DEGREE = Math.PI / 180;

/** Beyond this angle from the vertical a pixel is left out: the reflectances of oil and water meet, and areas run away. */
export const LIMIT_RAD = 75 * DEGREE;
/** From this angle on a person is warned: the contrast of oil to water falls, and a slight tilt moves areas a lot. */
export const WARNING_RAD = 60 * DEGREE;

/** What the view allows for one pixel. Stored as a byte. */
export const VIEW_STATUS = { good: 0, slanted: 1, tooSlanted: 2, aboveHorizon: 3 } as const;

/** The view status of each pixel from its incidence in radians. Above `limitRad` a pixel must be left out. */
export function viewStatus(incidenceRad: Float32Array, limitRad = LIMIT_RAD): Uint8Array {
  const status = new Uint8Array(incidenceRad.length);
  for (let i = 0; i < status.length; i++) {
    const angle = incidenceRad[i]!;
    status[i] =
      angle <= WARNING_RAD && angle <= limitRad
        ? VIEW_STATUS.good
        : angle <= limitRad
          ? VIEW_STATUS.slanted
          : angle < Math.PI / 2
            ? VIEW_STATUS.tooSlanted
            : VIEW_STATUS.aboveHorizon;
  }
  return status;
}

/** Shares of the looked-at pixels (all, or those with a non-zero `region` byte); they add to 1, or are all 0. */
export interface ViewShares {
  readonly good: number;
  readonly slanted: number;
  readonly tooSlanted: number;
  readonly aboveHorizon: number;
}

export function viewShares(status: Uint8Array, region?: Uint8Array): ViewShares {
  const counts = [0, 0, 0, 0];
  let total = 0;
  for (let i = 0; i < status.length; i++) {
    if (region?.[i] !== 0) {
      counts[status[i]!]!++;
      total++;
    }
  }
  const share = (code: number) => (total > 0 ? counts[code]! / total : 0);
  return {
    good: share(VIEW_STATUS.good),
    slanted: share(VIEW_STATUS.slanted),
    tooSlanted: share(VIEW_STATUS.tooSlanted),
    aboveHorizon: share(VIEW_STATUS.aboveHorizon),
  };
}

/** What to say about the angle of view, worst first; empty where all is seen steeply. */
export function viewNotices(shares: ViewShares): Notice[] {
  const notices: Notice[] = [];
  if (shares.good + shares.slanted === 0) {
    notices.push({
      code: 'view-no-water',
      text: 'No water is seen within 75° of the vertical: take a photo that looks further down.',
    });
  } else if (shares.tooSlanted > 0) {
    notices.push({
      code: 'view-excluded',
      text: `${percent(shares.tooSlanted)} of the region is seen at more than 75° from the vertical and is left out: go higher or closer to measure it.`,
    });
  }
  if (shares.aboveHorizon > 0) {
    notices.push({
      code: 'view-above-horizon',
      text: `${percent(shares.aboveHorizon)} of the region lies above the horizon and is left out: check the horizon marks.`,
    });
  }
  if (shares.slanted > 0) {
    notices.push({
      code: 'view-slanted',
      text: `${percent(shares.slanted)} of the region is seen at 60° to 75° from the vertical: areas there depend strongly on height and tilt, and film colours are weak.`,
    });
  }
  return notices;
}

function percent(share: number): string {
  return share < 0.01 ? 'Under 1 %' : `${Math.round(100 * share)} %`;
}

/** Takes the ground area (to NaN, in place) from every pixel that the view leaves out, and counts them. */
export function dropExcluded(areaM2: Float32Array, status: Uint8Array): number {
  let dropped = 0;
  for (let i = 0; i < status.length; i++) {
    if (status[i]! >= VIEW_STATUS.tooSlanted) {
      areaM2[i] = Number.NaN;
      dropped++;
    }
  }
  return dropped;
}
