import { PIXEL_STATUS, type ThicknessMap } from '../match/types.ts';
import type { Calibration } from './calibrate.ts';
import type { EstimateSummary, Notice } from './contract.ts';

const LEVELS = { p05: 0.05, p25: 0.25, p50: 0.5, p75: 0.75, p95: 0.95 } as const;
/** Bin of the thickness histogram that quantiles are read from, nm: finer than any interval. */
const BIN_NM = 0.25;

/** Counts, quantiles and notices of a finished map. */
export function summarise(
  map: ThicknessMap,
  calibration: Calibration,
  timingsMs: Readonly<Record<string, number>>,
): EstimateSummary {
  const byStatus = new Float64Array(8);
  const bins = new Uint32Array(Math.ceil(6000 / BIN_NM));
  let withThickness = 0;
  for (let i = 0; i < map.status.length; i++) {
    byStatus[map.status[i]!]!++;
    const d = map.thicknessNm[i]!;
    if (Number.isNaN(d)) continue;
    withThickness++;
    bins[Math.min(bins.length - 1, Math.floor(d / BIN_NM))]!++;
  }
  const counts = {
    total: map.status.length,
    inRegion: map.status.length - byStatus[PIXEL_STATUS.outside]!,
    measured: byStatus[PIXEL_STATUS.measured]!,
    bare: byStatus[PIXEL_STATUS.bare]!,
    ambiguous: byStatus[PIXEL_STATUS.ambiguous]!,
    atLeast: byStatus[PIXEL_STATUS.atLeast]!,
    noFilmColour: byStatus[PIXEL_STATUS.noFilmColour]!,
  };
  return {
    calibrated: calibration.calibrated,
    counts,
    quantilesNm: withThickness > 0 ? quantiles(bins, withThickness) : null,
    resolvableNm: calibration.resolvableNm,
    fit: calibration.fit,
    notices: [...calibration.notices, ...noticesOf(counts)],
    timingsMs,
  };
}

function quantiles(bins: Uint32Array, total: number): Record<keyof typeof LEVELS, number> {
  const at = (level: number) => {
    let sum = 0;
    for (let b = 0; b < bins.length; b++) {
      sum += bins[b]!;
      if (sum >= level * total) return b === 0 ? 0 : (b + 0.5) * BIN_NM;
    }
    return bins.length * BIN_NM;
  };
  return {
    p05: at(LEVELS.p05),
    p25: at(LEVELS.p25),
    p50: at(LEVELS.p50),
    p75: at(LEVELS.p75),
    p95: at(LEVELS.p95),
  };
}

function noticesOf(counts: EstimateSummary['counts']): Notice[] {
  const notices: Notice[] = [];
  const read = counts.measured + counts.ambiguous + counts.bare + counts.atLeast;
  if (counts.inRegion > 0 && read < 0.1 * counts.inRegion) {
    notices.push({
      code: 'little-film',
      text: 'Under a tenth of the region shows film colours: check that the film, the light and the references are the right ones.',
    });
  }
  if (read > 0 && counts.ambiguous > 0.1 * read) {
    notices.push({
      code: 'ambiguous',
      text: 'Over a tenth of the film could be of another order: set a pin where you know the order, or where the surface is bare.',
    });
  }
  if (read > 0 && counts.atLeast > 0.1 * read) {
    notices.push({
      code: 'past-colour',
      text: 'Over a tenth of the film is thicker than its colours can tell: those parts carry a lower bound only.',
    });
  }
  return notices;
}
