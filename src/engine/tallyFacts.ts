import type { CommonError } from '../match/commonError.ts';
import type { PhotoMetadata } from '../photo/types.ts';
import type { Calibration } from './calibrate.ts';
import { LEFT_OUT } from './leftOut.ts';

/** What is known of a measured photo besides its map. */
export interface TallyFacts {
  readonly metadata?: PhotoMetadata;
  /** Part of the region's pixels that are clipped. */
  readonly clippedShare?: number;
  /** What all thicknesses have in common; guesses (`DEFAULT_VOLUME_INPUTS`, the preset's index) where absent. */
  readonly common?: CommonError;
}

/** What the estimate leaves for the tally. */
export function tallyFactsOf(calibration: Calibration, leftOut: Uint8Array): TallyFacts {
  return { common: calibration.common, clippedShare: clippedShareOf(leftOut) };
}

/** Part of the region's pixels that are clipped (or a marked card), from the bytes of `leftOutOf`. */
function clippedShareOf(leftOut: Uint8Array): number {
  let inRegion = 0;
  let clipped = 0;
  for (let i = 0; i < leftOut.length; i++) {
    if (leftOut[i] !== LEFT_OUT.outsideRegion) inRegion++;
    if (leftOut[i] === LEFT_OUT.noColour) clipped++;
  }
  return inRegion > 0 ? clipped / inRegion : 0;
}
