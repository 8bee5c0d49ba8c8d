/** Figures of an observation in words: units spelt out, no more digits than the interval allows. */
import type { EstimateSummary } from '../engine/contract.ts';
import { formatInterval } from '../tally/rounding.ts';
import { inUnit, readableAreaUnit, readableVolumeUnit, type Unit } from '../tally/units.ts';
import type { Spread } from '../tally/volumeByThickness.ts';
import type { Conditions, ObservedPosition, ObservedTime, Source, Viewpoint } from './observation.ts';

const MONTHS = 'January February March April May June July August September October November December'.split(
  ' ',
);

/** "14 May 2025, 11:32 UTC"; a clock without an offset is quoted as such. */
export function timeWords({ utc, recorded }: ObservedTime): string {
  const parts = /^(\d{4})-(\d{2})-(\d{2})T(\d{2}:\d{2})/.exec(utc ?? recorded);
  if (!parts) return recorded;
  const [, year, month, day, clock] = parts;
  const date = `${Number(day)} ${MONTHS[Number(month) - 1] ?? month} ${year}, ${clock}`;
  return utc ? `${date} UTC` : `${date} by a clock of unknown offset`;
}

const SOURCE_WORDS: Readonly<Record<Source, string>> = {
  exif: 'from the photo’s own data',
  geolocation: 'from this device’s location',
  sensor: 'from this device’s sensors',
  device: 'from this device’s clock',
  typed: 'as typed',
  computed: 'computed',
  photo: 'measured in the photo',
};

export function sourceWords(source: Source): string {
  return SOURCE_WORDS[source];
}

/** "47 degrees 15.06 minutes north, 21 degrees 24.18 minutes west": a hundredth of a minute is 18 m or less. */
export function positionWords({ latitudeDeg, longitudeDeg }: ObservedPosition): string {
  return `${angleWords(latitudeDeg, 'north', 'south')}, ${angleWords(longitudeDeg, 'east', 'west')}`;
}

function angleWords(degrees: number, positive: string, negative: string): string {
  const hundredths = Math.round(Math.abs(degrees) * 6000);
  const minutes = ((hundredths % 6000) / 100).toFixed(2);
  return `${Math.floor(hundredths / 6000)} degrees ${minutes} minutes ${degrees < 0 ? negative : positive}`;
}

const FROM_WORDS: Readonly<Record<Viewpoint['from'], string>> = {
  aircraft: 'from an aircraft',
  drone: 'from a drone',
  vessel: 'from a vessel',
  shore: 'from the shore',
  bench: 'at a bench',
  unknown: 'from an unknown viewpoint',
};

/** "from the shore, 3.2 metres above the water, looking along 214.5 degrees true". */
export function viewpointWords({ from, heightM, headingDeg, headingReference }: Viewpoint): string {
  const parts = [FROM_WORDS[from]];
  if (heightM) parts.push(`${heightM.value} ${plural('metre', heightM.value)} above the water`);
  if (headingDeg) parts.push(`looking along ${headingDeg.value} degrees ${headingReference ?? 'by compass'}`);
  return parts.join(', ');
}

/** Degrees of the sea, World Meteorological Organization code table 3700. */
export const SEA_STATE_WORDS = [
  'calm, glassy',
  'calm, rippled',
  'smooth',
  'slight',
  'moderate',
  'rough',
  'very rough',
  'high',
  'very high',
  'phenomenal',
] as const;

const SKY_WORDS: Readonly<Record<NonNullable<Conditions['sky']>, string>> = {
  clear: 'clear sky',
  partlyCloudy: 'partly cloudy',
  overcast: 'overcast',
  fog: 'fog',
  rain: 'rain',
  night: 'night',
};

/** "wind 3 metres per second from 240 degrees"; one entry for each thing known. */
export function conditionWords(conditions: Conditions): string[] {
  const { windMS, windFromDeg, seaState, waveHeightM, sky, sun, visibilityKm, polariser } = conditions;
  const words: string[] = [];
  if (windMS !== undefined) {
    const from = windFromDeg === undefined ? '' : ` from ${windFromDeg} degrees`;
    words.push(`wind ${windMS} ${plural('metre', windMS)} per second${from}`);
  } else if (windFromDeg !== undefined) {
    words.push(`wind from ${windFromDeg} degrees`);
  }
  if (seaState !== undefined) words.push(`sea state ${seaState} (${SEA_STATE_WORDS[seaState]})`);
  if (waveHeightM !== undefined) words.push(`waves of ${waveHeightM} ${plural('metre', waveHeightM)}`);
  if (sky) words.push(SKY_WORDS[sky]);
  if (sun) {
    const { elevationDeg, azimuthDeg } = sun.value;
    words.push(`sun ${Math.round(elevationDeg)} degrees high, bearing ${Math.round(azimuthDeg)} degrees`);
  }
  if (visibilityKm !== undefined)
    words.push(`visibility ${visibilityKm} ${plural('kilometre', visibilityKm)}`);
  if (conditions.airTemperatureC !== undefined)
    words.push(`air ${conditions.airTemperatureC} degrees Celsius`);
  if (conditions.waterTemperatureC !== undefined) {
    words.push(`water ${conditions.waterTemperatureC} degrees Celsius`);
  }
  if (polariser) words.push(polariser === 'on' ? 'a polariser was on the lens' : 'no polariser');
  if (conditions.waterRemarks) words.push(conditions.waterRemarks);
  return words;
}

/** An interval ready to be set: figures in one unit, rounded to what the interval allows. */
export interface FiguresInUnit {
  readonly least: string;
  readonly best: string;
  readonly most: string;
  readonly unit: Unit;
}

export function volumeFigures(
  { least, best, most }: Spread,
  unit: Unit = readableVolumeUnit(best),
): FiguresInUnit {
  return figures(least, best, most, unit);
}

export function areaFigures(
  { least, best, most }: Spread,
  unit: Unit = readableAreaUnit(best),
): FiguresInUnit {
  return figures(least, best, most, unit);
}

function figures(least: number, best: number, most: number, unit: Unit): FiguresInUnit {
  const { low, value, high } = formatInterval(inUnit(least, unit), inUnit(best, unit), inUnit(most, unit));
  return { least: low, best: value, most: high, unit };
}

/**
 * Least and most by the appearance code, to two digits: its classes span factors of 4 to 17, and an interval's rounding
 * would take the lower end down to nothing.
 */
export function codeVolumeFigures(
  minM3: number,
  maxM3: number,
  unit: Unit = readableVolumeUnit(Math.sqrt(minM3 * maxM3)),
): Omit<FiguresInUnit, 'best'> {
  return { least: twoDigits(inUnit(minM3, unit)), most: twoDigits(inUnit(maxM3, unit)), unit };
}

/** Plain decimal notation with two significant digits. */
export function twoDigits(value: number): string {
  return String(Number(value.toPrecision(2)));
}

/** "68 %" as "68 percent"; never 0 for something that is there. */
export function percentWords(share: number): string {
  const percent = 100 * share;
  return percent > 0 && percent < 1 ? 'under 1 percent' : `${Math.round(percent)} percent`;
}

/** Film as a share of the pixels that gave an answer, for a photo without a scale; null where none did. */
export function pixelCoverageWords({ counts, quantilesNm }: EstimateSummary): string | null {
  const film = counts.measured + counts.ambiguous + counts.atLeast;
  const read = film + counts.bare;
  if (read === 0 || !quantilesNm) return null;
  return `Film on ${percentWords(film / read)} of the part of the photo that was read.`;
}

/** The unit in words for a printed figure: "1 litre", "0.5 litres", "84 millilitres", "3 barrels (42 US gallons)". */
export function plural(name: string, figure: string | number): string {
  if (Number(figure) === 1) return name;
  if (name === 'foot') return 'feet';
  return name.replace(/^(.*?)( \(|$)/, '$1s$2');
}
