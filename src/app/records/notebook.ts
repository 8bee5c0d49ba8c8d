import { newObservation } from '../../engine/newObservation.ts';
import type { Observation, ViewpointKind } from '../../record/observation.ts';
import { recordResult } from '../../record/recordResult.ts';
import { type AppearanceShares, type VolumeByCode, volumeByCode } from '../../tally/appearanceCode.ts';
import { sanityChecks } from '../../tally/sanityChecks.ts';
import { fromUnit, LENGTH_UNITS } from '../../tally/units.ts';
import { estimateWithoutPhoto } from '../../tally/withoutPhoto.ts';
import type { Notice } from '../../view/notice.ts';

export type LengthUnitId = keyof typeof LENGTH_UNITS;

/** What was typed, as typed: lengths in their units, shares in percent. */
export interface Notes {
  readonly length: number | undefined;
  readonly width: number | undefined;
  readonly unit: LengthUnitId;
  readonly coveragePercent: number | undefined;
  readonly sharesPercent: readonly (number | undefined)[];
  readonly windMS: number | undefined;
  readonly from: ViewpointKind;
}

export interface Reckoned {
  readonly volume: VolumeByCode | null;
  /** What is still missing, as a sentence; null where the volume could be worked out. */
  readonly missing: string | null;
  readonly notices: readonly Notice[];
}

/** Length by width by coverage by shares, with the checks of what was typed. */
export function reckon(notes: Notes): Reckoned {
  const { length, width, coveragePercent, sharesPercent, windMS, from } = notes;
  const shares = sharesPercent.map((percent) => (percent ?? 0) / 100) as unknown as AppearanceShares;
  const sum =
    Math.round(10 * sharesPercent.reduce<number>((total, percent) => total + (percent ?? 0), 0)) / 10;
  const facts = {
    ...(windMS !== undefined && { windMS }),
    ...(from !== 'bench' && { viewpoint: from }),
  };
  const missing =
    length === undefined || width === undefined
      ? 'Give the length and the width of the slick.'
      : coveragePercent === undefined
        ? 'Give the coverage: how much of that box is oiled.'
        : Math.abs(sum - 100) > 0.5
          ? sum === 0
            ? 'Share the oil out among the appearances.'
            : sum < 100
              ? `The shares add to ${sum} %: ${Math.round(10 * (100 - sum)) / 10} % are missing.`
              : `The shares add to ${sum} %: that is ${Math.round(10 * (sum - 100)) / 10} % too much.`
          : null;
  if (missing) return { volume: null, missing, notices: sanityChecks(facts) };
  try {
    const { lengthM, widthM, coverage } = slickOf(notes);
    const { oiledM2, maxM3 } = estimateWithoutPhoto({ lengthM, widthM, coverage, shares });
    return {
      volume: volumeByCode(oiledM2, shares),
      missing: null,
      notices: sanityChecks({ ...facts, shares, coverage, volumeM3: maxM3, areaM2: lengthM * widthM }),
    };
  } catch (error) {
    return { volume: null, missing: error instanceof Error ? error.message : String(error), notices: [] };
  }
}

function slickOf({ length = 0, width = 0, unit, coveragePercent = 0 }: Notes) {
  const factor = LENGTH_UNITS[unit];
  return {
    lengthM: decimal(fromUnit(length, factor)),
    widthM: decimal(fromUnit(width, factor)),
    coverage: coveragePercent / 100,
  };
}

/** Without binary dust: 0.3 nautical miles are 555.6 m. */
function decimal(value: number): number {
  return Number(value.toPrecision(12));
}

/** The notes as a record, ready to be kept. Nothing but what was typed goes in; the time is this device's. */
export function notebookObservation(
  notes: Notes,
  given: Pick<Parameters<typeof newObservation>[0], 'id' | 'nowUtc' | 'madeWith' | 'observer'>,
): Observation {
  const { volume, notices } = reckon(notes);
  const { lengthM, widthM, coverage } = slickOf(notes);
  const fresh = newObservation({
    ...given,
    title: 'Slick seen without a photo',
    from: notes.from,
    result: recordResult({ byCode: volume, notices }),
    ...(notes.windMS !== undefined && { conditions: { windMS: notes.windMS } }),
  });
  return {
    ...fresh,
    slickByEye: {
      ...(lengthM > 0 && { lengthM }),
      ...(widthM > 0 && { widthM }),
      ...(notes.coveragePercent !== undefined && { coverage }),
      ...(volume && { shares: volume.shares }),
    },
  };
}
