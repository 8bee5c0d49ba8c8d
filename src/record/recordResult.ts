import type { EstimateSummary, Notice } from '../engine/contract.ts';
import type { VolumeByCode } from '../tally/appearanceCode.ts';
import type { MethodComparison } from '../tally/compareMethods.ts';
import type { DrainageFit } from '../tally/drainageLaw.ts';
import type { OiledArea } from '../tally/oiledArea.ts';
import type { VolumeByThickness } from '../tally/volumeByThickness.ts';
import type { RecordedResult } from './observation.ts';

export interface ResultParts {
  readonly summary?: EstimateSummary | null;
  readonly area?: OiledArea | null;
  readonly byThickness?: VolumeByThickness | null;
  readonly byCode?: VolumeByCode | null;
  readonly comparison?: MethodComparison | null;
  readonly drainage?: readonly DrainageFit[];
  /** Of view, tally and sanity checks. */
  readonly notices?: readonly Notice[];
}

const orNull = (value: number) => (Number.isFinite(value) ? value : null);

/** Results in the form in which they are kept: no typed arrays, and null where there is no number. */
export function recordResult(parts: ResultParts): RecordedResult {
  return {
    summary: parts.summary ?? null,
    area: parts.area ? recordedArea(parts.area) : null,
    byThickness: parts.byThickness
      ? { ...parts.byThickness, meanThicknessNm: orNull(parts.byThickness.meanThicknessNm) }
      : null,
    byCode: parts.byCode ?? null,
    reasons: parts.comparison?.reasons ?? [],
    drainage: (parts.drainage ?? []).map((fit) => ({
      law: fit.law,
      parameters: fit.parameters.map(({ name, unit, value, sd }) => ({ name, unit, value, sd: orNull(sd) })),
      rootMeanSquareNm: fit.rootMeanSquareNm,
      birgeRatio: orNull(fit.birgeRatio),
      degreesOfFreedom: fit.degreesOfFreedom,
    })),
    notices: parts.notices ?? [],
  };
}

function recordedArea({ histogram: _, ...area }: OiledArea): NonNullable<RecordedResult['area']> {
  return {
    ...area,
    coverage: orNull(area.coverage),
    coverageLeast: orNull(area.coverageLeast),
    coverageMost: orNull(area.coverageMost),
  };
}
