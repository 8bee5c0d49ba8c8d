import type { ActivityMap } from '../match/activity.ts';
import { MOST_CANDIDATES, makeCandidateField } from '../match/candidates.ts';
import type { CodeChart } from '../match/codeChart.ts';
import { fillCandidates, type ReadingRules } from '../match/mapPixels.ts';
import { makePixelReader } from '../match/pixelReader.ts';
import { resolveOrders } from '../match/resolveOrders.ts';
import type { FilmSample } from '../match/sampleFilm.ts';
import type { PhotoPixels } from '../photo/types.ts';

/** Places of the rough order step: enough to follow the bands, few enough to take a moment. */
const PLACES = 60_000;
/** A sample may move this far from its settled thickness in the next fit, nm: under half an order. */
const FREEDOM_NM = 70;

/**
 * Settles orders roughly with a first camera and says which labels each film sample may take in the next fit, as
 * [from, to) pairs. Without this the fit and the orders can agree on a wrong reading of the weak high orders.
 */
export function settledRanges(
  pixels: PhotoPixels,
  activity: ActivityMap,
  sample: FilmSample,
  charts: readonly CodeChart[],
  rules: ReadingRules,
  leftOut: Uint8Array | null,
): Uint32Array {
  const spacing = Math.max(1, Math.ceil(Math.sqrt((pixels.width * pixels.height) / PLACES)));
  const field = makeCandidateField(
    Math.ceil(pixels.width / spacing),
    Math.ceil(pixels.height / spacing),
    spacing,
  );
  fillCandidates(pixels, makePixelReader(pixels, activity, charts), rules, leftOut, field, 0, field.height);
  const { choice } = resolveOrders(field);
  const labels = charts[0]!.count;
  const stepNm = charts[0]!.thicknessNm[1]!;
  const reach = Math.ceil(FREEDOM_NM / stepNm);
  const ranges = new Uint32Array(2 * sample.count);
  for (let i = 0; i < sample.count; i++) {
    const column = Math.min(field.width - 1, Math.floor(sample.at[2 * i]! / spacing));
    const row = Math.min(field.height - 1, Math.floor(sample.at[2 * i + 1]! / spacing));
    const place = row * field.width + column;
    const chosen = choice[place]!;
    ranges[2 * i + 1] = labels;
    if (chosen === 255) continue;
    const label = Math.round(field.thicknessNm[place * MOST_CANDIDATES + chosen]! / stepNm);
    ranges[2 * i] = Math.max(0, label - reach);
    ranges[2 * i + 1] = Math.min(labels, label + reach + 1);
  }
  return ranges;
}
