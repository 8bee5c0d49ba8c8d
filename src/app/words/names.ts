import type { FilmPreset, Setup } from '../../engine/setup.ts';

/** Films as a person calls them. */
export const FILM_NAMES: Readonly<Record<FilmPreset, string>> = {
  soap: 'Soap film',
  bubbleMix: 'Bubble mix',
  petrol: 'Petrol on water',
  kerosene: 'Kerosene, jet fuel',
  diesel: 'Diesel, gas oil',
  lubricatingOil: 'Lubricating oil',
  lightCrude: 'Light crude',
  mediumCrude: 'Medium crude',
  heavyCrude: 'Heavy crude, fuel oil',
  vegetableOil: 'Vegetable or fish oil',
  magnesiumFluorideOnGlass: 'Coating (MgF₂ on glass)',
};

export function filmName(film: Setup['film']): string {
  return typeof film === 'string' ? FILM_NAMES[film] : 'My own film';
}

/** Sky in words for a colour temperature of daylight (rule of thumb; the mirrored part of the sky counts). */
export function skyWords(daylightK: number): string {
  if (daylightK < 5200) return 'low sun, warm sky';
  if (daylightK < 6000) return 'sun and cloud';
  if (daylightK < 7200) return 'overcast';
  if (daylightK < 9500) return 'thin cloud, some blue';
  return 'clear blue sky';
}
