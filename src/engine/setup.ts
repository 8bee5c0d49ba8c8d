/** What a person says about a photo before it is measured: the typed form of SETUP.json. */
import type { IlluminantId } from '../colour/types.ts';

export const FILM_PRESETS = [
  'soap',
  'bubbleMix',
  'petrol',
  'kerosene',
  'diesel',
  'lubricatingOil',
  'lightCrude',
  'mediumCrude',
  'heavyCrude',
  'vegetableOil',
  'magnesiumFluorideOnGlass',
] as const;
export type FilmPreset = (typeof FILM_PRESETS)[number];

/** "My own" medium: a named material, or n_D with an Abbe number or Cauchy A and B (B in square micrometres), and k. */
export type MaterialSetup =
  | string
  | { readonly nD: number; readonly abbe?: number; readonly k?: number; readonly spread?: number }
  | { readonly cauchyA: number; readonly cauchyB: number; readonly k?: number; readonly spread?: number };

/** Exactly one layer has no thickness: it is the film that is measured. */
export interface StackSetup {
  readonly ambient: MaterialSetup;
  readonly layers: readonly { readonly material: MaterialSetup; readonly thicknessNm?: number }[];
  readonly substrate: MaterialSetup;
}

/** [x, y, width, height] in upright photo pixels. */
export type Rectangle = readonly [number, number, number, number];
export type Point = readonly [number, number];

export interface Pin {
  readonly at: Point;
  readonly is?: 'bare';
  readonly order?: number;
}

export interface Setup {
  readonly film: FilmPreset | StackSetup;
  readonly water?: { readonly temperatureC: number; readonly salinity: number };
  readonly light?: { readonly daylightK: number } | { readonly illuminant: IlluminantId };
  readonly camera?: 'cie1931' | 'phone' | { readonly fit: boolean };
  readonly references?: {
    readonly clean?: Rectangle;
    readonly white?: Rectangle;
    readonly whiteReflectance?: number;
    readonly dark?: Rectangle;
  };
  readonly incidenceDeg?: number;
  readonly maxThicknessNm?: number;
  readonly region?: readonly Point[];
  readonly pins?: readonly Pin[];
  readonly trend?: 'thickerDown';
}
