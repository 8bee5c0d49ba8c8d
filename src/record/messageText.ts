import { thicknessQuantiles } from '../tally/rounding.ts';
import { ANSWER_WORDS, amountAnswer } from './amountAnswer.ts';
import { filmName } from './filmWords.ts';
import {
  areaFigures,
  codeVolumeFigures,
  conditionWords,
  percentWords,
  pixelCoverageWords,
  plural,
  positionWords,
  timeWords,
  viewpointWords,
  volumeFigures,
} from './inWords.ts';
import type { Observation } from './observation.ts';

/** More would not be read out. */
const MOST_UNKNOWN = 4;

/**
 * A short text to be read out over radio or sent as a message: one sentence a line, most urgent first, units in words.
 * Lines about what is not in the record say so or are left out.
 */
export function messageText(observation: Observation): string {
  const isBench = observation.viewpoint.from === 'bench';
  return [
    `${isBench ? 'Liquid film' : 'Film on water'}, indicative report. ${observation.title}.`.replace(
      /\.\.$/,
      '.',
    ),
    observation.time ? `Seen ${timeWords(observation.time)}.` : 'Time not known.',
    positionLine(observation),
    `Seen ${viewpointWords(observation.viewpoint)}.`,
    isBench ? '' : oilLine(observation),
    ...(isBench ? thicknessLines(observation) : amountLines(observation)),
    sentence(conditionWords(observation.conditions)),
    observation.lookAlikes?.reason ?? '',
    unknownLine(observation.notKnown),
    isBench ? 'Figures are indicative.' : 'Figures are indicative; the responsible authority decides.',
  ]
    .filter((line) => line !== '')
    .join('\n');
}

function positionLine({ position, leftOut, placeName }: Observation): string {
  if (!position) return leftOut.includes('position') ? 'Position left out.' : 'Position not known.';
  return `Position ${positionWords(position)}${placeName ? `, ${placeName}` : ''}.`;
}

/** What it is, or else as what its colours were read: a title that names an oil is not taken for knowledge. */
function oilLine({ substance, setup }: Observation): string {
  if (substance) return `Oil type: ${substance.name}.`;
  if (!setup) return 'Oil type not known.';
  const name = filmName(setup.film);
  return `Oil type not known; colours read as ${name[0]!.toLowerCase()}${name.slice(1)}.`;
}

/** Thickness alone, where there is no more to say. */
function thicknessLines({ result }: Observation): string[] {
  const quantiles = result?.summary?.quantilesNm;
  if (!quantiles) return ['Thickness not known.'];
  const { p05, p50, p95 } = thicknessQuantiles(quantiles);
  return [`Thickness: median ${p50} nanometres, nine tenths of the pixels from ${p05} to ${p95}.`];
}

function amountLines(observation: Observation): string[] {
  const { result, slickByEye } = observation;
  const lines: string[] = [];
  if (slickByEye?.lengthM !== undefined && slickByEye.widthM !== undefined) {
    const { lengthM, widthM, coverage } = slickByEye;
    const oiled = coverage === undefined ? '' : `, ${percentWords(coverage)} of that oiled`;
    lines.push(`By eye ${lengthM} metres long, ${widthM} ${plural('metre', widthM)} wide${oiled}.`);
  }
  const answer = result && amountAnswer(result);
  if (answer === 'noOil' || answer === 'noAnswer') lines.push(`${ANSWER_WORDS[answer]}.`);
  if (answer === 'figures' && result?.byThickness) {
    const { least, best, most, unit } = areaFigures(result.byThickness.oiledM2);
    const coverage = result.area?.coverage;
    const share = coverage == null ? '' : `; ${percentWords(coverage)} of the water is oiled`;
    lines.push(`Oiled area ${least} to ${most} ${plural(unit.name, most)}, best ${best}${share}.`);
    const volume = volumeFigures(result.byThickness.volumeM3);
    const atLeast = result.byThickness.atLeast ? 'at least ' : '';
    lines.push(
      `Volume by thickness ${atLeast}${volume.least} to ${volume.most} ${plural(volume.unit.name, volume.most)}, best ${volume.best}.`,
    );
  }
  if (result?.byCode && result.byCode.maxM3 > 0) {
    const { least, most, unit } = codeVolumeFigures(result.byCode.minM3, result.byCode.maxM3);
    const atLeast = result.byCode.atLeast ? 'at least ' : '';
    lines.push(`Volume by appearance code ${atLeast}${least} to ${most} ${plural(unit.name, most)}.`);
  }
  if (lines.length > 0) return lines;
  lines.push('Amount not known.');
  const coverage = result?.summary && pixelCoverageWords(result.summary);
  if (coverage) lines.push(coverage, ...thicknessLines(observation));
  return lines;
}

function sentence(words: readonly string[]): string {
  if (words.length === 0) return '';
  const text = words.join(', ');
  return `${text[0]!.toUpperCase()}${text.slice(1)}.`;
}

function unknownLine(notKnown: readonly string[]): string {
  if (notKnown.length === 0) return '';
  const named = notKnown.slice(0, MOST_UNKNOWN).map((text) => {
    const plain = text.replace(/\.$/, '');
    return `${plain[0]!.toLowerCase()}${plain.slice(1)}`;
  });
  const more = notKnown.length - named.length;
  return `Not known: ${named.join('; ')}${more > 0 ? `; and ${more} more` : ''}.`;
}
