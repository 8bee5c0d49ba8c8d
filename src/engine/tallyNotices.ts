import type { PhotoMetadata } from '../photo/types.ts';
import { APPEARANCE_CODE_SCOPE } from '../tally/appearanceCode.ts';
import type { MappedShares } from '../tally/appearanceShares.ts';
import { sanityChecks } from '../tally/sanityChecks.ts';
import type { VolumeByThickness } from '../tally/volumeByThickness.ts';
import { glintReport } from '../view/glint.ts';
import { slopeVariance } from '../view/seaSlope.ts';
import { type SunPosition, sunNotices, sunPosition } from '../view/sun.ts';
import { type ViewShares, viewNotices } from '../view/viewLimits.ts';
import type { Notice } from './contract.ts';
import type { PhotoView } from './photoView.ts';
import type { PositionSetup, Setup } from './setup.ts';
import type { TallyOptions, TallyShares } from './tallyContract.ts';
import type { TallyFacts } from './tallyFacts.ts';

/** Typed, else the photo's own; null where neither says. */
export function positionOf(setup: Setup, metadata?: PhotoMetadata): PositionSetup | null {
  const { latitudeDeg, longitudeDeg } = setup.position ?? metadata?.position ?? {};
  return latitudeDeg !== undefined && longitudeDeg !== undefined ? { latitudeDeg, longitudeDeg } : null;
}

/** Typed (true), else the photo's own; null where neither says. A magnetic one is taken as it is, and a notice says so. */
export function headingOf(setup: Setup, metadata?: PhotoMetadata): number | null {
  return setup.headingDeg ?? metadata?.headingDeg ?? null;
}

/** Null where the time is not known in UTC, or the position is not. */
export function sunOf(setup: Setup, metadata?: PhotoMetadata): SunPosition | null {
  const position = positionOf(setup, metadata);
  if (!position || !metadata?.takenAt || !metadata.takenAtHasOffset) return null;
  return sunPosition(Date.parse(metadata.takenAt), position.latitudeDeg, position.longitudeDeg);
}

/** Wind that glitter is looked for with where nobody said: a light breeze, m/s. */
const UNSAID_WIND_MS = 3;

export interface TallySaid {
  readonly setup: Setup;
  readonly options: TallyOptions;
  readonly facts: TallyFacts;
  readonly sun: SunPosition | null;
  readonly headingDeg: number | null;
  readonly shares: TallyShares;
  readonly mapped: MappedShares;
  /** Absent where there is no view. */
  readonly view?: PhotoView;
  readonly seen?: ViewShares;
  readonly byThickness?: VolumeByThickness;
}

/** All that should be read before the figures are used: view, sun, sanity of the figures, what the code was made for. */
export function tallyNotices(said: TallySaid): Notice[] {
  const { view, seen, mapped, shares } = said;
  return [
    ...(view ? view.notices : [NO_SCALE]),
    ...(seen ? viewNotices(seen) : []),
    ...sunAndGlitter(said),
    ...sanityChecks(sanityFacts(said)),
    ...mapped.notices,
    ...(shares.used && said.options.viewpoint !== 'aircraft' ? [CODE_SCOPE] : []),
  ];
}

const NO_SCALE: Notice = {
  code: 'no-scale',
  text: 'The photo gives no scale, so there are shares but no square metres or litres: give the height of the camera and mark the horizon, or give the size of a pixel on the water.',
};

const CODE_SCOPE: Notice = { code: 'code-scope', text: APPEARANCE_CODE_SCOPE };

function sunAndGlitter({ setup, facts, sun, headingDeg, view }: TallySaid): Notice[] {
  const notices: Notice[] = [];
  const { metadata } = facts;
  if (setup.headingDeg === undefined && headingDeg !== null && metadata?.headingReference === 'magnetic') {
    notices.push({
      code: 'heading-magnetic',
      text: 'The photo’s heading is from magnetic north and is taken as true: type the true heading where the declination matters.',
    });
  }
  if (!sun) return notices;
  notices.push(...sunNotices(sun));
  if (view?.view && headingDeg !== null) {
    const slopes = slopeVariance(setup.windMS ?? UNSAID_WIND_MS, 'clean').total;
    const { notice } = glintReport(view.view, sun, headingDeg, slopes);
    if (notice) notices.push(notice);
  }
  return notices;
}

/** The view's angles are left to `viewNotices`, the scope of the code to its own sentence: neither is said twice. */
function sanityFacts({ setup, options, facts, sun, shares, byThickness }: TallySaid) {
  const { metadata, clippedShare } = facts;
  return {
    ...(shares.from === 'observer' && shares.used && { shares: shares.used }),
    ...(byThickness &&
      byThickness.oiledM2.best > 0 && {
        volumeM3: byThickness.volumeM3.best,
        areaM2: byThickness.oiledM2.best,
      }),
    ...(setup.windMS !== undefined && { windMS: setup.windMS }),
    ...(options.polariser && { polariser: options.polariser }),
    ...(metadata?.whiteBalance && { whiteBalance: metadata.whiteBalance }),
    referenceMarked: setup.references?.clean !== undefined || setup.references?.white !== undefined,
    ...(clippedShare !== undefined && { clippedShare }),
    ...(sun && { sunElevationDeg: sun.elevationDeg }),
  };
}
