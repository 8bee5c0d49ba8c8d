import * as v from 'valibot';

const finite = v.pipe(v.number(), v.finite());
const count = v.pipe(finite, v.minValue(0), v.integer());
const notice = v.strictObject({ code: v.string(), text: v.string() });

/**
 * What the engine said of a map (`EstimateSummary`). Loose objects: the engine's summary may say more from version to
 * version, and what it said must come back whole.
 */
export const summarySchema = v.looseObject({
  calibrated: v.boolean(),
  counts: v.looseObject({
    total: count,
    inRegion: count,
    measured: count,
    bare: count,
    ambiguous: count,
    atLeast: count,
    noFilmColour: count,
  }),
  quantilesNm: v.nullable(v.looseObject({ p05: finite, p25: finite, p50: finite, p75: finite, p95: finite })),
  resolvableNm: v.looseObject({ fromNm: finite, toNm: finite }),
  fit: v.nullable(
    v.looseObject({
      determined: v.picklist(['well', 'partly', 'no']),
      spanNm: v.strictTuple([finite, finite]),
      residualCodes: finite,
      parameters: v.array(v.looseObject({ name: v.string(), value: finite, sd: finite, priorSd: finite })),
      advice: v.string(),
    }),
  ),
  notices: v.array(notice),
  timingsMs: v.record(v.string(), finite),
});
