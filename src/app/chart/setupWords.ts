import type { MaterialSetup, Setup } from '../../engine/setup.ts';
import { onWater } from '../state.ts';
import { filmName, skyWords } from '../words/names.ts';

/** What a chart depends on; the rest of a set-up (references, pins, region) belongs to a photo. */
export type ChartSetup = Pick<Setup, 'film' | 'water' | 'light' | 'camera' | 'incidenceDeg'>;

/** The sky that is assumed where nobody named a light; the engine assumes the same. */
export const ASSUMED_DAYLIGHT_K = 6500;

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

export function isSeenByEye(camera: Setup['camera']): boolean {
  return camera === undefined || camera === 'cie1931';
}

export function observerWords(camera: Setup['camera']): string {
  return isSeenByEye(camera) ? 'seen by eye (CIE 1931 observer)' : 'seen by a typical phone camera';
}

/** What the film lies on, in words; for a film of one's own, its layers from the top. Empty for films in air. */
export function surfaceWords({ film, water }: ChartSetup): string {
  if (typeof film !== 'string') {
    const layers = film.layers.map(({ material, thicknessNm }) =>
      thicknessNm === undefined
        ? `${materialWords(material)} (measured)`
        : `${materialWords(material)} ${thicknessNm} nm`,
    );
    return [materialWords(film.ambient), ...layers, materialWords(film.substrate)].join(' / ');
  }
  if (!onWater(film)) return '';
  // Fresh water of 20 °C is what the engine puts under an oil when nobody names the water.
  return water
    ? `on water of ${water.temperatureC} °C, salinity ${water.salinity}`
    : 'on fresh water of 20 °C';
}

function materialWords(material: MaterialSetup): string {
  if (typeof material === 'string') return material;
  const k = material.k ? ` k ${material.k}` : '';
  return 'nD' in material
    ? `n ${material.nD}${k}`
    : `Cauchy A ${material.cauchyA} B ${material.cauchyB} µm²${k}`;
}

/** The set-up in three lines, as it must stand on everything that leaves the screen; the film comes first. */
export function setupLines(setup: ChartSetup): [string, string, string] {
  const angle = `${setup.incidenceDeg ?? 0}° from the vertical`;
  const surface = surfaceWords(setup);
  return [
    filmName(setup.film),
    capital(surface ? `${surface}, ${angle}` : angle),
    capital(`${lightWords(setup.light)}, ${observerWords(setup.camera)}`),
  ];
}

const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);

/** "soap-film-0deg": for file names, in ASCII. */
export function fileStem({ film, incidenceDeg = 0 }: ChartSetup): string {
  const name = filmName(film)
    .replaceAll('₂', '2')
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, '-')
    .replace(/^-|-$/g, '');
  return `${name}-${incidenceDeg}deg`;
}
