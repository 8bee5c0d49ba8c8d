import { quantileOfSorted } from './statistics.ts';
import type { TallyReading } from './tallyScene.ts';

/** Figures that issue "Oil on water" sets for slanted photos. */
export const TALLY_AIMS = { oiled: 0.1, coverage: 0.03, volume: 0.2, held: [0.88, 0.92] } as const;

/** How far tallies are from the truth, as lines to print; empty without tallies. */
export function tallyLines(readings: readonly TallyReading[]): string[] {
  if (readings.length === 0) return [];
  const errors = (name: string, unit: string, aim: number, pick: (reading: TallyReading) => number) => {
    const values = readings.map(pick);
    const sizes = values.map(Math.abs).sort((a, b) => a - b);
    const within = values.filter((value) => Math.abs(value) <= aim).length;
    const middle = quantileOfSorted(
      [...values].sort((a, b) => a - b),
      0.5,
    );
    const figure = (value: number, sign = '') => `${sign}${(100 * value).toFixed(1)} ${unit}`;
    return `  ${name}: median off by ${figure(quantileOfSorted(sizes, 0.5))}, 90th percentile ${figure(quantileOfSorted(sizes, 0.9))}, median error ${figure(middle, middle > 0 ? '+' : '')}; within the aim of ${100 * aim} ${unit}: ${share(within, values.length)}`;
  };
  const held = (name: string, pick: (reading: TallyReading) => boolean) =>
    `  ${name} holds the truth: ${share(readings.filter(pick).length, readings.length)}`;
  const median = (pick: (reading: TallyReading) => number) =>
    quantileOfSorted(
      readings.map(pick).sort((a, b) => a - b),
      0.5,
    );
  const least = Math.min(...readings.map(({ codeFactor }) => codeFactor));
  const most = Math.max(...readings.map(({ codeFactor }) => codeFactor));
  return [
    `How much, over ${readings.length} slanted photos (height told to 5 %, pitch to 0.5°):`,
    errors('oiled area', '%', TALLY_AIMS.oiled, ({ oiledError }) => oiledError),
    errors(
      'oiled area, true height',
      '%',
      TALLY_AIMS.oiled,
      ({ oiledErrorTrueHeight }) => oiledErrorTrueHeight,
    ),
    errors('coverage', 'points', TALLY_AIMS.coverage, ({ coverageError }) => coverageError),
    errors('volume by thickness', '%', TALLY_AIMS.volume, ({ volumeError }) => volumeError),
    errors(
      'volume, true height',
      '%',
      TALLY_AIMS.volume,
      ({ volumeErrorTrueHeight }) => volumeErrorTrueHeight,
    ),
    `${held('90 % interval of the volume', ({ volumeHeld }) => volumeHeld)} (aim 88 to 92 %)`,
    held('90 % interval of the oiled area', ({ oiledHeld }) => oiledHeld),
    held('least to most by appearance code', ({ codeHeld }) => codeHeld),
    `  most / least: by thickness ${median(({ thicknessFactor }) => thicknessFactor).toFixed(2)}, by the code ${least.toFixed(1)} to ${most.toFixed(1)}`,
    `  no answer on ${(100 * median(({ unreadShare }) => unreadShare)).toFixed(1)} % of the region (glint, mirrored walls, posts)`,
  ];
}

function share(part: number, whole: number): string {
  return `${((100 * part) / whole).toFixed(0)} % (${part} of ${whole})`;
}
