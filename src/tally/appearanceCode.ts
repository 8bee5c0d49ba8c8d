/**
 * The Bonn Agreement Oil Appearance Code (BAOAC): five appearances, each with an interval of layer thickness. Intervals as
 * in A. Lewis, Current Status of the BAOAC, report to the Netherlands North Sea Agency, January 2007, table 1, and in the
 * Bonn Agreement Aerial Operations Handbook, part 3, annex A.
 */
export const APPEARANCE_CODE_VERSION =
  'Bonn Agreement Oil Appearance Code, five codes, as in the Bonn Agreement Aerial Operations Handbook, part 3, annex A (table checked against Lewis, January 2007)';

/** To be said with every result of the code. */
export const APPEARANCE_CODE_SCOPE =
  'The appearance code was made for trained observers in aircraft, by day and in good visibility, looking down steeply. A photo from a quay, a bank or a boat is outside its stated scope: take these volumes as a rough guide to how serious it is.';

export type AppearanceCode = 1 | 2 | 3 | 4 | 5;

export interface Appearance {
  readonly code: AppearanceCode;
  readonly name: string;
  readonly minUm: number;
  /** Code 5 has no upper bound; practice takes 200 µm for both ends, and totals with it say "at least". */
  readonly maxUm: number;
  readonly openEnded: boolean;
}

export const APPEARANCES: readonly Appearance[] = [
  { code: 1, name: 'Sheen (silvery/grey)', minUm: 0.04, maxUm: 0.3, openEnded: false },
  { code: 2, name: 'Rainbow', minUm: 0.3, maxUm: 5, openEnded: false },
  { code: 3, name: 'Metallic', minUm: 5, maxUm: 50, openEnded: false },
  { code: 4, name: 'Discontinuous true oil colour', minUm: 50, maxUm: 200, openEnded: false },
  { code: 5, name: 'Continuous true oil colour', minUm: 200, maxUm: 200, openEnded: true },
];

/** Share of the oiled area in each of codes 1 to 5 (index 0 is code 1); they add to 1. */
export type AppearanceShares = readonly [number, number, number, number, number];

/** How far the shares' sum may be from 1: half a percentage point, so that percentages typed whole must add to 100. */
export const SHARES_TOLERANCE = 0.005;

export interface CodeVolume {
  readonly code: AppearanceCode;
  readonly areaM2: number;
  readonly minM3: number;
  readonly maxM3: number;
}

export interface VolumeByCode {
  readonly oiledM2: number;
  readonly shares: AppearanceShares;
  readonly parts: readonly CodeVolume[];
  readonly minM3: number;
  readonly maxM3: number;
  /** True where code 5 has a share: both totals are then "at least". */
  readonly atLeast: boolean;
  readonly version: string;
}

/**
 * The code's own arithmetic: oiled area times share times the lower and the upper thickness of each code, summed.
 * 1 µm over 1 m2 is 1 mL.
 * @throws RangeError where the area is negative, or the shares are negative or do not add to 100 %
 */
export function volumeByCode(oiledM2: number, shares: AppearanceShares): VolumeByCode {
  if (!(oiledM2 >= 0 && Number.isFinite(oiledM2))) {
    throw new RangeError('The oiled area must be 0 or more square metres.');
  }
  mustBeShares(shares);
  const parts = APPEARANCES.map(({ code, minUm, maxUm }) => {
    const areaM2 = oiledM2 * shares[code - 1]!;
    return { code, areaM2, minM3: areaM2 * minUm * 1e-6, maxM3: areaM2 * maxUm * 1e-6 };
  });
  return {
    oiledM2,
    shares,
    parts,
    minM3: parts.reduce((sum, part) => sum + part.minM3, 0),
    maxM3: parts.reduce((sum, part) => sum + part.maxM3, 0),
    atLeast: shares[4] > 0,
    version: APPEARANCE_CODE_VERSION,
  };
}

/** @throws RangeError where a share is negative or the sum is not 1 */
export function mustBeShares(shares: readonly number[]): void {
  const sum = shares.reduce((total, share) => total + share, 0);
  if (shares.length !== 5 || shares.some((share) => !(share >= 0))) {
    throw new RangeError('Give the share of each of the five appearance codes, 0 % or more.');
  }
  if (Math.abs(sum - 1) > SHARES_TOLERANCE) {
    throw new RangeError(
      `The shares of the appearance codes add to ${Math.round(1000 * sum) / 10} %, not 100 %: correct them.`,
    );
  }
}
