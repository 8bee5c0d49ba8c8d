/** How much there is on a measured photo. Data only: it crosses from the worker to the page, and goes into files. */
import type { AppearanceShares, VolumeByCode } from '../tally/appearanceCode.ts';
import type { MappedShares } from '../tally/appearanceShares.ts';
import type { MethodComparison } from '../tally/compareMethods.ts';
import type { OiledArea } from '../tally/oiledArea.ts';
import type { VolumeByThickness } from '../tally/volumeByThickness.ts';
import type { LengthCheck } from '../view/groundScale.ts';
import type { SunPosition } from '../view/sun.ts';
import type { ViewShares } from '../view/viewLimits.ts';
import type { Notice } from './contract.ts';
import type { PositionSetup, Setup } from './setup.ts';

export interface TallyOptions {
  /** The observer's own shares of appearance codes 1 to 5, adding to 1; the map's where absent. */
  readonly shares?: AppearanceShares;
  /** Film past the resolvable range counts as this code: 3 where the observer saw a mirror. Default 2. */
  readonly atLeastCode?: 2 | 3;
  /** Of the Monte Carlo trials: the same seed gives the same interval. Default 1. */
  readonly seed?: number;
  readonly trials?: number;
  /** From an aircraft the appearance code is within its scope, from elsewhere a notice says that it is not. */
  readonly viewpoint?: 'aircraft' | 'drone' | 'vessel' | 'shore' | 'unknown';
  readonly polariser?: 'on' | 'off' | 'unknown';
}

/** What `Engine.tally` takes. */
export interface TallyRequest extends TallyOptions {
  /**
   * A set-up whose view (height and how sure it is), wind, position or heading has changed since the estimate; that of the
   * estimate where absent. Changes of what the colours were read with need a new estimate.
   */
  readonly setup?: Setup;
}

/** Oiled share of the region's water, 0 to 1. */
export interface Coverage {
  /** Of the water that gave an answer; null where none did. */
  readonly share: number | null;
  /** Were all unread water bare, and were all of it oiled; null where the view leaves no water. */
  readonly least: number | null;
  readonly most: number | null;
}

/** Shares of the looked-at part of the region; they add to 1 (each 0 where there is none). */
export interface RegionShares {
  readonly oiled: number;
  readonly bare: number;
  readonly unread: number;
}

export interface HistogramOfShares {
  /** Bin i runs from i * stepNm up to (i + 1) * stepNm; the last one holds all that is thicker. */
  readonly stepNm: number;
  /** Of the film that has a thickness, adding to 1 (all 0 without film). */
  readonly share: Float64Array;
}

/** Where the shares of codes come from, and what the map alone says of them. */
export interface TallyShares {
  /** Those that volumes are worked out with; null where there is no film thick enough for a code. */
  readonly used: AppearanceShares | null;
  readonly from: 'map' | 'observer';
  readonly ofMap: AppearanceShares | null;
  /** Shares of the oiled area: film under 0.04 µm, and film past the resolvable range. */
  readonly belowCode: number;
  readonly atLeast: number;
}

interface TallyOfShares {
  readonly coverage: Coverage;
  readonly regionShares: RegionShares;
  readonly histogram: HistogramOfShares;
  readonly shares: TallyShares;
  /** Of the oiled area: past the resolvable range, and of unsettled order. */
  readonly atLeastShare: number;
  readonly ambiguousShare: number;
  /** Pixels of the region that count. */
  readonly countedPixels: number;
  /** Where the sun stood; null where time or position is not known. */
  readonly sun: SunPosition | null;
  /** WGS 84: typed, else the photo's own; null where neither says. */
  readonly position: PositionSetup | null;
  /** Of the camera's axis, degrees clockwise from true north; null where not known. */
  readonly headingDeg: number | null;
  readonly notices: readonly Notice[];
}

/** The view is known: everything in square metres and cubic metres. Shares are by area on the water. */
export interface TallyInMetres extends TallyOfShares {
  readonly scale: 'metres';
  readonly area: OiledArea;
  readonly mapped: MappedShares;
  readonly byThickness: VolumeByThickness;
  /** Null where there is no film thick enough to have a code. */
  readonly byCode: VolumeByCode | null;
  readonly comparison: MethodComparison | null;
  /** Of the region's pixels, by angle of view. */
  readonly viewShares: ViewShares;
  /** Part of the region's pixels that the view leaves out: beyond 75 degrees, or above the horizon. */
  readonly excludedShare: number;
  /** Degrees from the vertical over the pixels that count; null where none does. */
  readonly incidenceDeg: { readonly least: number; readonly most: number } | null;
  /** A known length beside what the view makes of it; null without one. */
  readonly lengthCheck: LengthCheck | null;
}

/** No view is known: shares by pixel count, and no metres are made up. */
export interface TallyInPixels extends TallyOfShares {
  readonly scale: 'pixels';
  readonly area: null;
  readonly mapped: null;
  readonly byThickness: null;
  readonly byCode: null;
  readonly comparison: null;
  readonly viewShares: null;
  readonly excludedShare: null;
  readonly incidenceDeg: null;
  readonly lengthCheck: null;
}

export type TallyReport = TallyInMetres | TallyInPixels;
