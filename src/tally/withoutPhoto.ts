import { type AppearanceShares, type VolumeByCode, volumeByCode } from './appearanceCode.ts';

/** What an observer with a notebook has: a box round the slick, how much of it is oiled, and what the oil looks like. */
export interface ObservedSlick {
  readonly lengthM: number;
  readonly widthM: number;
  /** Oiled share of the box, 0 to 1. */
  readonly coverage: number;
  readonly shares: AppearanceShares;
}

export interface EstimateWithoutPhoto extends VolumeByCode {
  readonly boxM2: number;
  readonly coverage: number;
}

/**
 * Length times width times coverage, then the appearance code's arithmetic (Bonn Agreement Aerial Operations Handbook,
 * part 3, annex A, section 6: measure the box, then the oiled share, then the share of each code within the oil).
 * @throws RangeError where a length is not positive, the coverage is not in 0 to 1, or the shares do not add to 100 %
 */
export function estimateWithoutPhoto({
  lengthM,
  widthM,
  coverage,
  shares,
}: ObservedSlick): EstimateWithoutPhoto {
  if (!(lengthM > 0 && widthM > 0 && Number.isFinite(lengthM * widthM))) {
    throw new RangeError('Give the length and the width of the slick, both more than 0.');
  }
  if (!(coverage >= 0 && coverage <= 1)) {
    throw new RangeError('The coverage must lie between 0 and 100 %.');
  }
  const boxM2 = lengthM * widthM;
  return { ...volumeByCode(boxM2 * coverage, shares), boxM2, coverage };
}
