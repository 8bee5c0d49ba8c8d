import { MOST_CANDIDATES, makeCandidateField } from '../match/candidates.ts';
import type { CodeChart } from '../match/codeChart.ts';
import { fillCandidates, type ReadingRules } from '../match/mapPixels.ts';
import type { PixelReader } from '../match/pixelReader.ts';
import { resolveOrders } from '../match/resolveOrders.ts';
import type { FilmSample } from '../match/sampleFilm.ts';
import type { PhotoPixels } from '../photo/types.ts';
import type { PlacedSample } from './slantedOptics.ts';

/** Places of the rough order step: enough to follow the bands, few enough to take a moment. */
const PLACES = 60_000;
/**
 * The first camera may be off, and then every place of a thick part is off alike: colours are trusted little here, and
 * the film's continuity a lot (set on seeded scenes through measured cameras; at 1, whole parts move by an order).
 */
const ROUGH_TRUST = 0.1;
/** A sample may move this far from its settled thickness in the next fit, nm: under half an order. */
const FREEDOM_NM = 70;

/**
 * Settles orders roughly with a first camera and says which labels each film sample may take in the next fit, as
 * [from, to) pairs. `reader` and `chart` are of that camera; `placed` says in which strip of a slanted photo samples lie. Without this the fit and the orders can agree on a wrong reading of the weak high orders.
 */
export function settledRanges(
  pixels: PhotoPixels,
  sample: FilmSample,
  placed: PlacedSample | null,
  reader: PixelReader,
  chart: CodeChart,
  rules: ReadingRules,
  leftOut: Uint8Array | null,
): Uint32Array {
  const spacing = Math.max(1, Math.ceil(Math.sqrt((pixels.width * pixels.height) / PLACES)));
  const field = makeCandidateField(
    Math.ceil(pixels.width / spacing),
    Math.ceil(pixels.height / spacing),
    spacing,
  );
  fillCandidates(pixels, reader, rules, leftOut, field, 0, field.height);
  const { choice } = resolveOrders(field, { trust: ROUGH_TRUST });
  const labels = placed?.rows ?? chart.count;
  const stepNm = chart.thicknessNm[1]!;
  const reach = Math.ceil(FREEDOM_NM / stepNm);
  const ranges = new Uint32Array(2 * sample.count);
  for (let i = 0; i < sample.count; i++) {
    const column = Math.min(field.width - 1, Math.floor(sample.at[2 * i]! / spacing));
    const row = Math.min(field.height - 1, Math.floor(sample.at[2 * i + 1]! / spacing));
    const place = row * field.width + column;
    const chosen = choice[place]!;
    const first = placed ? placed.allowed[2 * i]! : 0;
    ranges[2 * i] = first;
    ranges[2 * i + 1] = first + labels;
    if (chosen === 255) continue;
    const seenNm = field.thicknessNm[place * MOST_CANDIDATES + chosen]! * (placed ? placed.scale[i]! : 1);
    const label = Math.min(labels - 1, Math.round(seenNm / stepNm));
    ranges[2 * i] = first + Math.max(0, label - reach);
    ranges[2 * i + 1] = first + Math.min(labels, label + reach + 1);
  }
  return ranges;
}
