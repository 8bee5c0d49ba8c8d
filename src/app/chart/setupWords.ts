import type { Setup } from '../../engine/setup.ts';
import { filmName, skyWords } from '../words/names.ts';

/** What a chart depends on; the rest of a set-up (references, pins, region) belongs to a photo. */
export type ChartSetup = Pick<Setup, 'film' | 'water' | 'light' | 'camera' | 'incidenceDeg'>;

/** The sky that is assumed where nobody named a light; the engine assumes the same. */
const ASSUMED_DAYLIGHT_K = 6500;

export function chartSetup({ film, water, light, camera, incidenceDeg }: Setup): ChartSetup {
  return {
    film,
    ...(water ? { water } : {}),
    ...(light ? { light } : {}),
    ...(camera ? { camera } : {}),
    ...(incidenceDeg === undefined ? {} : { incidenceDeg }),
  };
}

export function lightWords(light: Setup['light']): string {
  if (light && 'illuminant' in light) return `CIE illuminant ${light.illuminant}`;
  const kelvin = light?.daylightK ?? ASSUMED_DAYLIGHT_K;
  return `daylight of ${kelvin} K (${skyWords(kelvin)})`;
}

export function observerWords(camera: Setup['camera']): string {
  return camera === undefined || camera === 'cie1931'
    ? 'seen by eye (CIE 1931 observer)'
    : 'seen by a typical phone camera';
}

/** The set-up in a few lines, as it must stand on everything that leaves the screen. */
export function setupLines(setup: ChartSetup): string[] {
  const { film, water, light, camera, incidenceDeg = 0 } = setup;
  const onWater = water ? `, on water of ${water.temperatureC} °C and salinity ${water.salinity}` : '';
  return [
    `${filmName(film)}${onWater}`,
    `Light: ${lightWords(light)}`,
    `${incidenceDeg}° from the vertical, ${observerWords(camera)}`,
  ];
}

/** "soap-film-0deg": for file names, in ASCII. */
export function fileStem({ film, incidenceDeg = 0 }: ChartSetup): string {
  const name = filmName(film)
    .replaceAll('₂', '2')
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, '-')
    .replace(/^-|-$/g, '');
  return `${name}-${incidenceDeg}deg`;
}
