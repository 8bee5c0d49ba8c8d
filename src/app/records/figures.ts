import { ANSWER_WORDS, amountAnswer } from '../../record/amountAnswer.ts';
import { areaFigures, codeVolumeFigures, plural, volumeFigures } from '../../record/inWords.ts';
import type { Observation, ObservedPosition } from '../../record/observation.ts';
import { thicknessQuantiles } from '../../tally/rounding.ts';

export interface Figure {
  readonly name: string;
  readonly value: string;
  readonly more?: string;
}

/** What came out, as a person reads it: units in words, least and most before anything else. */
export function figuresOf({ result, slickByEye }: Observation): Figure[] {
  const figures: Figure[] = [];
  const { byThickness, byCode, area, summary } = result ?? {};
  const answer = result && amountAnswer(result);
  if (answer === 'noOil' || answer === 'noAnswer') {
    figures.push({
      name: 'Oiled area',
      value: answer === 'noOil' ? 'no oil read' : 'no answer',
      more: `${ANSWER_WORDS[answer]}.`,
    });
  } else if (byThickness) {
    const oiled = areaFigures(byThickness.oiledM2);
    const coverage = area?.coverage;
    figures.push({
      name: 'Oiled area',
      value: `${oiled.least} to ${oiled.most} ${plural(oiled.unit.name, oiled.most)}`,
      more: `best ${oiled.best}${coverage == null ? '' : `; ${share(coverage)} of the water looked at`}`,
    });
    const volume = volumeFigures(byThickness.volumeM3);
    figures.push({
      name: 'Volume by thickness',
      value: `${byThickness.atLeast ? 'at least ' : ''}${volume.least} to ${volume.most} ${plural(volume.unit.name, volume.most)}`,
      more: `best ${volume.best}`,
    });
  } else if (byCode) {
    const oiled = areaFigures({ least: byCode.oiledM2, best: byCode.oiledM2, most: byCode.oiledM2 });
    const eye = slickByEye?.coverage === undefined ? '' : `${share(slickByEye.coverage)} of the box`;
    figures.push({
      name: slickByEye ? 'Oiled area, by eye' : 'Oiled area',
      value: `${oiled.best} ${plural(oiled.unit.name, oiled.best)}`,
      ...(eye && { more: eye }),
    });
  }
  if (byCode && byCode.maxM3 > 0) {
    const { least, most, unit } = codeVolumeFigures(byCode.minM3, byCode.maxM3);
    figures.push({
      name: 'Volume by appearance code',
      value: `${byCode.atLeast ? 'at least ' : ''}${least} to ${most} ${plural(unit.name, most)}`,
      more: 'least to most; the code gives no best',
    });
  }
  if (summary?.quantilesNm) {
    const { p05, p50, p95 } = thicknessQuantiles(summary.quantilesNm);
    figures.push({
      name: 'Thickness',
      value: `${p50} nm, the median`,
      more: `nine tenths of the pixels from ${p05} to ${p95} nm`,
    });
  }
  return figures;
}

/** One line for a list. */
export function amountLine(observation: Observation): string {
  const figures = figuresOf(observation);
  const [first] = figures;
  if (!first) return 'no figures';
  const volume = figures.find(({ name }) => name.startsWith('Volume'));
  return volume && volume !== first ? `${first.value}; ${volume.value}` : first.value;
}

/** "47° 15.06′ N, 21° 24.18′ W": a hundredth of a minute is 18 m or less. */
export function positionShort({ latitudeDeg, longitudeDeg }: ObservedPosition): string {
  return `${angleShort(latitudeDeg, 'N', 'S')}, ${angleShort(longitudeDeg, 'E', 'W')}`;
}

function angleShort(degrees: number, positive: string, negative: string): string {
  const hundredths = Math.round(Math.abs(degrees) * 6000);
  const minutes = ((hundredths % 6000) / 100).toFixed(2);
  return `${Math.floor(hundredths / 6000)}°\u00a0${minutes}′\u00a0${degrees < 0 ? negative : positive}`;
}

function share(value: number): string {
  const percent = 100 * value;
  return percent > 0 && percent < 1 ? 'under 1 %' : `${Math.round(percent)} %`;
}
