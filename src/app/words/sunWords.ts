import type { SunPosition } from '../../view/sun.ts';

const AROUND = [
  'ahead',
  'ahead, to the right',
  'to the right',
  'behind, to the right',
  'behind you',
  'behind, to the left',
  'to the left',
  'ahead, to the left',
] as const;
const COMPASS = ['north', 'north-east', 'east', 'south-east', 'south', 'south-west', 'west', 'north-west'];

const eighth = (degrees: number) => Math.round((((degrees % 360) + 360) % 360) / 45) % 8;

/** "ahead, to the left", for a camera whose axis bears `headingDeg`; "in the south-east" where that is not known. */
export function sunSideWords(sun: SunPosition, headingDeg: number | null): string {
  return headingDeg === null
    ? `in the ${COMPASS[eighth(sun.azimuthDeg)]}`
    : (AROUND[eighth(sun.azimuthDeg - headingDeg)] ?? '');
}

/** "Sun 23° high, ahead, to the left", or null at night. */
export function sunWords(sun: SunPosition, headingDeg: number | null): string | null {
  if (sun.elevationDeg <= 0) return null;
  return `Sun ${Math.round(sun.elevationDeg)}° high, ${sunSideWords(sun, headingDeg)}`;
}
