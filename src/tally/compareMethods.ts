import type { Notice } from '../view/notice.ts';
import type { VolumeByCode } from './appearanceCode.ts';
import type { VolumeByThickness } from './volumeByThickness.ts';

export interface MethodComparison {
  /** most / least of each method: how wide it leaves the question. NaN where the least is 0. */
  readonly thicknessFactor: number;
  readonly codeFactor: number;
  /** Whether the two intervals have a volume in common. */
  readonly overlap: boolean;
  /** Why they differ, most telling first; empty where they agree and nothing needs saying. */
  readonly reasons: readonly Notice[];
}

/** Film that carries no appearance code or went into one by assumption; from `sharesFromMap`. */
export interface ComparisonFacts {
  readonly belowM2?: number;
  readonly atLeastM2?: number;
}

/** Volume by thickness and by appearance code side by side, with the reasons for a difference. */
export function compareMethods(
  byThickness: VolumeByThickness,
  byCode: VolumeByCode,
  facts: ComparisonFacts = {},
): MethodComparison {
  const { least, best, most } = byThickness.volumeM3;
  const overlap = least <= byCode.maxM3 && most >= byCode.minM3;
  const reasons: Notice[] = [];
  if (byCode.shares[3] > 0 || byCode.shares[4] > 0) {
    reasons.push({
      code: 'compare-true-colour',
      text: 'The observer called true oil colour (codes 4 and 5). Interference colours cannot see such layers, so the volume by thickness does not count their oil.',
    });
  }
  if (byThickness.atLeast) {
    reasons.push({
      code: 'compare-at-least',
      text: `${percent(byThickness.atLeastShare)} of the oiled area is past what colour can tell. By thickness it enters with its lower bound only; the code gives it the whole interval of its class.`,
    });
  }
  if ((facts.belowM2 ?? 0) > 0) {
    reasons.push({
      code: 'compare-below-visible',
      text: 'Some film is thinner than 0.04 µm. By thickness it counts; the code has no class for it.',
    });
  }
  const areaRatio = byCode.oiledM2 / byThickness.oiledM2.best;
  if (Math.abs(Math.log(areaRatio)) > Math.log(1.1)) {
    reasons.push({
      code: 'compare-area',
      text: `The two oiled areas differ by a factor of ${(areaRatio > 1 ? areaRatio : 1 / areaRatio).toPrecision(2)}: area and coverage, not thickness, are the main source of error.`,
    });
  }
  if (!overlap && reasons.length === 0) {
    reasons.push({
      code: 'compare-shares',
      text: 'The shares of the appearance codes do not follow from the measured thickness: check the observed shares, and the references in the photo.',
    });
  }
  if (overlap && byCode.maxM3 / byCode.minM3 > most / least) {
    reasons.push({
      code: 'compare-wide-classes',
      text: `The code knows only its classes, which span a factor of 4 to 17; the colours inside a class narrow it down${best < byCode.minM3 * 1.5 ? ', here to its thin end' : ''}.`,
    });
  }
  return {
    thicknessFactor: most / least,
    codeFactor: byCode.maxM3 / byCode.minM3,
    overlap,
    reasons,
  };
}

function percent(share: number): string {
  return share < 0.01 ? 'Under 1 %' : `${Math.round(100 * share)} %`;
}
