import { getPosition } from 'suncalc';
import type { Notice } from './notice.ts';

/** Where the sun stands. Elevation is apparent (refraction counted); azimuth runs clockwise from true north. */
export interface SunPosition {
  readonly elevationDeg: number;
  readonly azimuthDeg: number;
}

/**
 * The sun at an instant (milliseconds since 1970, UTC) and a place (degrees, WGS 84, east and north positive), by
 * suncalc (Meeus, Astronomical Algorithms, chapters 16, 22 and 25; about 0.01 degrees).
 * @throws RangeError where the time or the place makes no sense
 */
export function sunPosition(timeMs: number, latitudeDeg: number, longitudeDeg: number): SunPosition {
  if (!Number.isFinite(timeMs)) {
    throw new RangeError('The sun needs a time: give the UTC time of the photo.');
  }
  if (!(Math.abs(latitudeDeg) <= 90 && Math.abs(longitudeDeg) <= 180)) {
    throw new RangeError(
      'The latitude must lie between -90 and 90, the longitude between -180 and 180 degrees.',
    );
  }
  const { altitude, azimuth } = getPosition(new Date(timeMs), latitudeDeg, longitudeDeg);
  return { elevationDeg: altitude, azimuthDeg: azimuth };
}

/** Below this elevation the light is reddened and changes across the frame. */
const LOW_SUN_DEG = 10;

/**
 * What the sun's height alone gives reason to say: night, twilight, low sun; empty by day. Below the horizon suncalc still
 * adds the horizon's half degree of refraction, so night begins half a degree late, which does not matter here.
 */
export function sunNotices({ elevationDeg }: SunPosition): Notice[] {
  if (elevationDeg < -6) {
    return [
      {
        code: 'sun-night',
        text: 'It was night there at that time: check the clock, its offset and the position, or tell the light by hand.',
      },
    ];
  }
  if (elevationDeg < 0) {
    return [
      {
        code: 'sun-twilight',
        text: 'The sun was below the horizon: twilight is very blue and uneven, so mark bare water close to the film.',
      },
    ];
  }
  if (elevationDeg < LOW_SUN_DEG) {
    return [
      {
        code: 'sun-low',
        text: `The sun stood only ${Math.round(elevationDeg)}° high: the colour of the light changes across the sky, so mark bare water close to the film.`,
      },
    ];
  }
  return [];
}
