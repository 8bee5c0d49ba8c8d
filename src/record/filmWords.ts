import type { FilmPreset, Setup } from '../engine/setup.ts';

/** Films as a person calls them. */
export const FILM_NAMES: Readonly<Record<FilmPreset, string>> = {
  soap: 'Soap film',
  bubbleMix: 'Bubble mix',
  petrol: 'Petrol',
  kerosene: 'Kerosene, jet fuel',
  diesel: 'Diesel, gas oil',
  lubricatingOil: 'Lubricating oil',
  lightCrude: 'Light crude',
  mediumCrude: 'Medium crude',
  heavyCrude: 'Heavy crude, fuel oil',
  vegetableOil: 'Vegetable or fish oil',
  magnesiumFluorideOnGlass: 'Coating (MgF₂ on glass)',
};

/** The film of a set-up in words. */
export function filmName(film: Setup['film']): string {
  return typeof film === 'string' ? (FILM_NAMES[film] ?? film) : 'My own film';
}
