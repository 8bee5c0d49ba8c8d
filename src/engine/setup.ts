/** What a person says about a photo before it is measured: the typed form of SETUP.json. */
import type { IlluminantId } from '../colour/types.ts';
import type { KeptCamera } from './keptCamera.ts';

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

/**
 * How the camera looked at level water: a slanted view by `heightM`, focal length and either the horizon or angles; or
 * straight down by `pixelSizeM`, or by `heightM` with a pitch of -90.
 */
export interface ViewSetup {
  /** Height of the lens above the water. */
  readonly heightM?: number;
  /** 35 mm-equivalent focal length; the photo's own where left out. */
  readonly focal35mm?: number;
  /** Two places on the horizon, upright photo pixels. */
  readonly horizon?: readonly [Point, Point];
  /** Of the camera's axis: above the horizontal is positive, so looking down is negative. */
  readonly pitchDeg?: number;
  /** Positive where the camera is turned clockwise, seen from behind it. */
  readonly rollDeg?: number;
  /** Width of a pixel on the water, straight down. */
  readonly pixelSizeM?: number;
  /** One radial distortion coefficient, see `view/pinholeCamera.ts`. */
  readonly radial?: number;
  /** A length on the water, both ends at the waterline: a check of the rest, or with `sets` the source of the height. */
  readonly knownLength?: {
    readonly ends: readonly [Point, Point];
    readonly lengthM: number;
    readonly sets?: boolean;
  };
  /** How sure, one standard deviation; stated defaults where left out. */
  readonly heightSdShare?: number;
  readonly focalSdShare?: number;
  readonly pitchSdDeg?: number;
  readonly rollSdDeg?: number;
}

/** A finger's stroke that takes pixels in or out; later strokes lie over earlier ones and over the region. */
export interface Stroke {
  readonly paint: 'in' | 'out';
  readonly points: readonly Point[];
  /** Full width of the brush in upright photo pixels. */
  readonly widthPx: number;
}

/** WGS 84, degrees; south and west are negative. */
export interface PositionSetup {
  readonly latitudeDeg: number;
  readonly longitudeDeg: number;
}

export interface Setup {
  readonly film: FilmPreset | StackSetup;
  readonly water?: { readonly temperatureC: number; readonly salinity: number };
  readonly light?: { readonly daylightK: number } | { readonly illuminant: IlluminantId };
  /** `kept`: this phone's camera as an earlier photo fitted it, the prior of this fit. */
  readonly camera?: 'cie1931' | 'phone' | { readonly fit: boolean; readonly kept?: KeptCamera };
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
  /** Parts painted in or out by finger: glint, foam, hull, shadow. */
  readonly strokes?: readonly Stroke[];
  readonly view?: ViewSetup;
  /** At 10 m above the water; its waves spread the angle of incidence. */
  readonly windMS?: number;
  readonly position?: PositionSetup;
  /** Where the camera's axis points, degrees clockwise from true north. */
  readonly headingDeg?: number;
}
