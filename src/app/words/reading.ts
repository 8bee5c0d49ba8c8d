import type { EstimateSummary, Probe } from '../../engine/contract.ts';
import { PIXEL_STATUS } from '../../match/types.ts';
import { thicknessQuantiles } from '../../tally/rounding.ts';
import { intervalText, orderText, shareText, thicknessText } from './numbers.ts';

/** What a reading says: a big line, a quiet line, and the sentence a person would say. */
export interface ReadingWords {
  readonly big: string;
  readonly quiet: string;
  readonly sentence: string;
}

/** Share from which another order is worth naming. */
const WORTH_NAMING = 0.05;

/** Words for a probe. */
export function readingWords(probe: Probe, resolvableToNm: number): ReadingWords {
  if (probe.status === PIXEL_STATUS.bare) {
    return {
      big: 'Bare',
      quiet: 'no film to be seen',
      sentence: 'Bare surface here, or a film too thin to tell from it.',
    };
  }
  if (probe.status === PIXEL_STATUS.atLeast) {
    const bound = Math.floor(resolvableToNm / 50) * 50;
    return {
      big: `Over ${bound.toLocaleString('en-GB')} nm`,
      quiet: 'past the end of colour',
      sentence: `At least ${bound.toLocaleString('en-GB')} nm: thicker than its colours can tell here.`,
    };
  }
  if (probe.status === PIXEL_STATUS.outside) {
    return {
      big: 'Outside',
      quiet: 'not in the region',
      sentence: 'This place lies outside the marked region.',
    };
  }
  if (probe.status === PIXEL_STATUS.noFilmColour || Number.isNaN(probe.mapThicknessNm)) {
    return {
      big: 'No film colour',
      quiet: 'glint, foam, hull or too bright',
      sentence: 'The colour here is not one that this film can have.',
    };
  }
  const { mapThicknessNm: d, mapLowNm: low, mapHighNm: high } = probe;
  const chosen = nearest(probe, d);
  const other = probe.readings.find(
    (r) => r !== chosen && r.order !== chosen?.order && r.share >= WORTH_NAMING,
  );
  const order = chosen ? orderText(chosen.order) : '';
  const unsure = probe.status === PIXEL_STATUS.ambiguous;
  const next = other ? `${thicknessText(other.thicknessNm, other.highNm - other.lowNm)} nm` : null;
  return {
    big: `${thicknessText(d, high - low)} nm`,
    quiet: `${intervalText(low, high)} nm${order ? ` · ${order}` : ''}`,
    sentence: sentenceOf(unsure, next),
  };
}

/** What the figures above it leave open. */
function sentenceOf(unsure: boolean, next: string | null): string {
  if (unsure) return next ? `Order not sure: it could be ${next}.` : 'Order not sure.';
  return next ? `9 in 10 sure; next best ${next}.` : '9 in 10 sure; no other order fits.';
}

function nearest(probe: Probe, d: number) {
  return [...probe.readings].sort((a, b) => Math.abs(a.thicknessNm - d) - Math.abs(b.thicknessNm - d))[0];
}

/** Two sentences on a whole map. Its quantiles count bare surface as 0 nm. */
export function summaryWords({ counts, quantilesNm }: EstimateSummary): string {
  const read = counts.measured + counts.ambiguous;
  if (!quantilesNm || read === 0) {
    return counts.bare > 0
      ? `Only bare surface: ${shareText(counts.bare, counts.inRegion)} of the region.`
      : 'No film colours were found in the region.';
  }
  const parts = [`Film on ${shareText(read, counts.inRegion)} of the region`];
  if (counts.bare > 0) parts.push(`bare surface on ${shareText(counts.bare, counts.inRegion)}`);
  const { p50: half, p95: most } = thicknessQuantiles(quantilesNm);
  const spans =
    half === '0'
      ? `95 % of what was read is under ${most} nm`
      : `Half of what was read is under ${half} nm, 95 % of it under ${most} nm`;
  return `${parts.join(', ')}. ${spans}.`;
}
