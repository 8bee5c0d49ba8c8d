/** Where a raster lies on the ground, and the GeoTIFF tags that say so (OGC GeoTIFF 1.1, 19-008r4). */
import { ASCII, asciiOf, DOUBLE, SHORT, type TiffTag } from './tiffDirectory.ts';

/**
 * The system in which `westM` and `northM` are counted, all in metres:
 * `local`, an engineering grid of its own without a place on the globe;
 * `aboutPoint`, east and north of a point on WGS 84 (transverse Mercator about it at scale 1: true to a few millimetres
 * over the kilometres that a photo sees, and any reader of GeoTIFF can place it);
 * `epsg`, a projected system by its code, for example 32633 for WGS 84 / UTM zone 33 north.
 */
export type GroundSystem =
  | { readonly kind: 'local' }
  | { readonly kind: 'aboutPoint'; readonly latitudeDeg: number; readonly longitudeDeg: number }
  | { readonly kind: 'epsg'; readonly code: number };

export interface GeoPlacement {
  readonly system: GroundSystem;
  /** Coordinates of the outer corner of the top left pixel, metres east and north. */
  readonly westM: number;
  readonly northM: number;
  /** Side of a pixel, metres. */
  readonly pixelM: number;
}

export const MODEL_PIXEL_SCALE = 33550;
export const MODEL_TIEPOINT = 33922;
const GEO_KEY_DIRECTORY = 34735;
const GEO_DOUBLE_PARAMS = 34736;
const GEO_ASCII_PARAMS = 34737;

const USER_DEFINED = 32767;
const METRE = 9001;
const DEGREE = 9102;
const WGS_84 = 4326;

/** A key with a value of its own in the directory, or one that points into the doubles or the text. */
type GeoKey =
  | { readonly id: number; readonly short: number }
  | { readonly id: number; readonly double: number }
  | { readonly id: number; readonly text: string };

function keysOf(system: GroundSystem): GeoKey[] {
  if (system.kind === 'epsg') {
    return [
      { id: 1024, short: 1 },
      { id: 1025, short: 1 },
      { id: 3072, short: system.code },
    ];
  }
  if (system.kind === 'local') {
    return [
      { id: 1024, short: USER_DEFINED },
      { id: 1025, short: 1 },
      { id: 1026, text: 'Local ground grid, metres' },
      { id: 3076, short: METRE },
    ];
  }
  return [
    { id: 1024, short: 1 },
    { id: 1025, short: 1 },
    { id: 1026, text: 'Metres east and north of the camera' },
    { id: 2048, short: WGS_84 },
    { id: 2054, short: DEGREE },
    { id: 3072, short: USER_DEFINED },
    { id: 3073, text: 'Metres east and north of the camera' },
    { id: 3074, short: USER_DEFINED },
    // Transverse Mercator.
    { id: 3075, short: 1 },
    { id: 3076, short: METRE },
    { id: 3080, double: system.longitudeDeg },
    { id: 3081, double: system.latitudeDeg },
    { id: 3082, double: 0 },
    { id: 3083, double: 0 },
    { id: 3092, double: 1 },
  ];
}

/** @throws RangeError where the pixel size is not positive or a coordinate is not a number */
export function geoTags({ system, westM, northM, pixelM }: GeoPlacement): TiffTag[] {
  if (!(pixelM > 0) || ![pixelM, westM, northM].every(Number.isFinite)) {
    throw new RangeError('A raster on the ground needs a pixel size above 0 and a corner, in metres.');
  }
  const keys = keysOf(system);
  const directory: number[] = [1, 1, 1, keys.length];
  const doubles: number[] = [];
  let text = '';
  for (const key of keys) {
    if ('short' in key) {
      directory.push(key.id, 0, 1, key.short);
    } else if ('double' in key) {
      directory.push(key.id, GEO_DOUBLE_PARAMS, 1, doubles.length);
      doubles.push(key.double);
    } else {
      // Each text ends with a bar, which the count includes.
      directory.push(key.id, GEO_ASCII_PARAMS, key.text.length + 1, text.length);
      text += `${key.text}|`;
    }
  }
  const tags: TiffTag[] = [
    { id: MODEL_PIXEL_SCALE, type: DOUBLE, values: [pixelM, pixelM, 0] },
    { id: MODEL_TIEPOINT, type: DOUBLE, values: [0, 0, 0, westM, northM, 0] },
    { id: GEO_KEY_DIRECTORY, type: SHORT, values: directory },
  ];
  if (doubles.length > 0) tags.push({ id: GEO_DOUBLE_PARAMS, type: DOUBLE, values: doubles });
  if (text !== '') tags.push({ id: GEO_ASCII_PARAMS, type: ASCII, values: asciiOf(text) });
  return tags;
}
