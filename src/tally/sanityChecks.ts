import type { Notice } from '../view/notice.ts';
import { APPEARANCES, SHARES_TOLERANCE } from './appearanceCode.ts';
import { LEAST_VISIBLE_UM } from './appearanceShares.ts';

/** What is known of an observation; a check speaks only where it has what it needs. */
export interface SanityFacts {
  /** Shares of codes 1 to 5, 0 to 1. */
  readonly shares?: readonly number[];
  /** Volume and the area it is said to lie on, with the oiled share of that area (1 where it is the oiled area). */
  readonly volumeM3?: number;
  readonly areaM2?: number;
  readonly coverage?: number;
  readonly windMS?: number;
  /** Steepest and most slanted incidence in the region, degrees from the vertical. */
  readonly incidenceDeg?: { readonly least: number; readonly most: number };
  readonly polariser?: 'on' | 'off' | 'unknown';
  readonly whiteBalance?: 'auto' | 'manual' | 'unknown';
  /** True where bare water or a grey card is marked: it takes most of the white balance out. */
  readonly referenceMarked?: boolean;
  /** Share of the region's pixels that are clipped, 0 to 1. */
  readonly clippedShare?: number;
  /** How the area was typed or is shown. */
  readonly areaUnit?: 'metric' | 'squareMile' | 'statuteSquareMile' | 'nauticalSquareMile' | 'acre';
  readonly volumeUnit?: 'metric' | 'gallon' | 'usGallon' | 'imperialGallon' | 'barrel';
  readonly sunElevationDeg?: number;
  /** Where the photo was taken from. */
  readonly viewpoint?: 'aircraft' | 'drone' | 'vessel' | 'shore' | 'unknown';
}

type Check = (facts: SanityFacts) => Notice | null;

/** All checks, in the order in which they are shown. */
export const SANITY_CHECKS: readonly Check[] = [
  sharesAddUp,
  meanThicknessVisible,
  meanThicknessPossible,
  coverageInRange,
  windSuits,
  viewAngle,
  polariserOff,
  whiteBalanceFixed,
  skyClipped,
  whichMile,
  whichGallon,
  daylight,
  codeScope,
];

/** Everything that the checks have to say; empty where nothing stands out. */
export function sanityChecks(facts: SanityFacts): Notice[] {
  return SANITY_CHECKS.flatMap((check) => check(facts) ?? []);
}

function sharesAddUp({ shares }: SanityFacts): Notice | null {
  if (!shares) {
    return null;
  }
  const sum = shares.reduce((total, share) => total + share, 0);
  return Math.abs(sum - 1) > SHARES_TOLERANCE || shares.some((share) => !(share >= 0))
    ? {
        code: 'shares-not-100',
        text: `The shares of the appearance codes add to ${Math.round(1000 * sum) / 10} %: correct them to 100 %.`,
      }
    : null;
}

/** A stated volume must not be thinner, over its oiled area, than what can be seen at all. */
function meanThicknessVisible({ volumeM3, areaM2, coverage = 1 }: SanityFacts): Notice | null {
  const meanUm = meanThicknessUm(volumeM3, areaM2);
  if (!(meanUm >= 0) || !(coverage > 0) || meanUm >= LEAST_VISIBLE_UM * coverage) {
    return null;
  }
  const most = Math.round((100 * meanUm) / LEAST_VISIBLE_UM);
  return {
    code: 'mean-too-thin',
    text: `This volume over this area means ${meanUm.toPrecision(2)} µm on average, under the ${LEAST_VISIBLE_UM} µm that can be seen (times the coverage): it could cover at most ${most} % of the area visibly. Check the units, the area and the coverage.`,
  };
}

/** A film of centimetres is a unit slip, not a slick: emulsion seldom exceeds a few millimetres. */
function meanThicknessPossible({ volumeM3, areaM2 }: SanityFacts): Notice | null {
  const meanUm = meanThicknessUm(volumeM3, areaM2);
  return meanUm > 10_000
    ? {
        code: 'mean-too-thick',
        text: `This volume over this area means ${(meanUm / 1000).toPrecision(2)} mm on average, thicker than oil lies on open water. Check the units.`,
      }
    : null;
}

function coverageInRange({ coverage }: SanityFacts): Notice | null {
  return coverage !== undefined && !(coverage >= 0 && coverage <= 1)
    ? { code: 'coverage-range', text: 'The coverage must lie between 0 and 100 %: correct it.' }
    : null;
}

function windSuits({ windMS }: SanityFacts): Notice | null {
  if (windMS === undefined) {
    return null;
  }
  if (windMS < 2) {
    return {
      code: 'wind-low',
      text: 'In a wind under 2 m/s calm patches and natural slicks look like oil, and oil does not stand out: look for colour and a clear edge.',
    };
  }
  return windMS > 7
    ? {
        code: 'wind-high',
        text: 'In a wind above 7 m/s waves fade the colours and drive oil under: less is seen than is there.',
      }
    : null;
}

function viewAngle({ incidenceDeg }: SanityFacts): Notice | null {
  if (!incidenceDeg || !(incidenceDeg.most > 60)) {
    return null;
  }
  return incidenceDeg.most > 75
    ? {
        code: 'view-beyond-75',
        text: 'Part of the region is seen at more than 75° from the vertical: it is left out. Go higher or closer.',
      }
    : {
        code: 'view-beyond-60',
        text: 'Part of the region is seen at more than 60° from the vertical: areas depend strongly on height and tilt there, and colours are weak.',
      };
}

function polariserOff({ polariser }: SanityFacts): Notice | null {
  return polariser === 'on'
    ? {
        code: 'polariser-on',
        text: 'A polariser takes out the very reflection that carries the colours, most of all near 53° to 56°: take the photo again without it.',
      }
    : null;
}

function whiteBalanceFixed({ whiteBalance, referenceMarked }: SanityFacts): Notice | null {
  return whiteBalance === 'auto' && !referenceMarked
    ? {
        code: 'white-balance-auto',
        text: 'The camera chose its own white balance: mark bare water or a grey card in the photo, and lock the white balance next time.',
      }
    : null;
}

function skyClipped({ clippedShare }: SanityFacts): Notice | null {
  return clippedShare !== undefined && clippedShare > 0.01
    ? {
        code: 'sky-clipped',
        text: `${Math.round(100 * clippedShare)} % of the region is clipped, as where the film mirrors a bright sky: it gives no answer there. Expose less.`,
      }
    : null;
}

function whichMile({ areaUnit }: SanityFacts): Notice | null {
  return areaUnit === 'squareMile'
    ? {
        code: 'which-mile',
        text: 'Say which square mile: a nautical one is 3.43 km², a statute one 2.59 km². Mixing them up is worth a third.',
      }
    : null;
}

function whichGallon({ volumeUnit }: SanityFacts): Notice | null {
  return volumeUnit === 'gallon'
    ? {
        code: 'which-gallon',
        text: 'Say which gallon: an imperial one is 4.55 L, a US one 3.79 L.',
      }
    : null;
}

function daylight({ sunElevationDeg }: SanityFacts): Notice | null {
  return sunElevationDeg !== undefined && sunElevationDeg < 0
    ? {
        code: 'no-daylight',
        text: 'The sun was below the horizon: the appearance code is for daylight, and colours are not to be trusted.',
      }
    : null;
}

function codeScope({ shares, viewpoint }: SanityFacts): Notice | null {
  return shares && (viewpoint === 'shore' || viewpoint === 'vessel')
    ? {
        code: 'code-scope',
        text: `Volumes by appearance code are meant for trained observers in aircraft; from ${viewpoint === 'shore' ? 'the shore' : 'a vessel'} they are outside the code’s scope (codes ${APPEARANCES[0]!.code} to ${APPEARANCES[4]!.code}).`,
      }
    : null;
}

function meanThicknessUm(volumeM3: number | undefined, areaM2: number | undefined): number {
  return volumeM3 !== undefined && areaM2 !== undefined && areaM2 > 0
    ? (1e6 * volumeM3) / areaM2
    : Number.NaN;
}
