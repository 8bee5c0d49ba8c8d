import type { EstimateSummary, Probe } from '../../engine/contract.ts';
import { PIXEL_STATUS } from '../../match/types.ts';
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
  const next = other ? `; next best ${thicknessText(other.thicknessNm, other.highNm - other.lowNm)} nm` : '';
  return {
    big: `${thicknessText(d, high - low)} nm`,
    quiet: `${intervalText(low, high)} nm${order ? ` · ${order}` : ''}`,
    sentence: `${unsure ? 'Not sure: about' : 'About'} ${thicknessText(d, high - low)} nm, ${intervalText(low, high)}${order ? `; ${order}` : ''}${next}.`,
  };
}

function nearest(probe: Probe, d: number) {
  return [...probe.readings].sort((a, b) => Math.abs(a.thicknessNm - d) - Math.abs(b.thicknessNm - d))[0];
}

/** Coarsest interval whose rounding a median is given: medians of many pixels are sharper than one pixel. */
const MEDIAN_WIDTH_NM = 20;

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
  const spread = quantilesNm.p95 - quantilesNm.p05;
  const half = thicknessText(quantilesNm.p50, Math.min(spread, MEDIAN_WIDTH_NM));
  const most = thicknessText(quantilesNm.p95, spread);
  const spans =
    half === '0'
      ? `95 % of what was read is under ${most} nm`
      : `Half of what was read is under ${half} nm, 95 % of it under ${most} nm`;
  return `${parts.join(', ')}. ${spans}.`;
}
