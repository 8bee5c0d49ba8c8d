import type { ThicknessMap } from '../match/types.ts';
import { encodeFloatTiff } from '../record/floatTiff.ts';
import { type JsonValue, writeGeoJson } from '../record/geojson.ts';
import type { GroundSystem } from '../record/geoPlacement.ts';
import { slickFeatures } from '../record/slickFeatures.ts';
import { type GroundMapping, gridFor, onGround, turnedMapping } from '../record/worldGrid.ts';
import { offsetPosition } from '../view/footprint.ts';
import { pinholeCamera } from '../view/pinholeCamera.ts';
import { straightDownFromPixelSize } from '../view/straightDown.ts';
import { dropExcluded, viewStatus } from '../view/viewLimits.ts';
import { groundAreaField, incidenceField } from '../view/waterFields.ts';
import { groundAt, placeOf, type WaterView } from '../view/waterView.ts';
import { missingOfView } from './partialView.ts';
import { photoViewOf, withPhotoFocal } from './photoView.ts';
import type { PositionSetup, Setup } from './setup.ts';

/** Where the photo was taken and how it looked, as far as known. */
export interface GroundFacts {
  readonly map: ThicknessMap;
  readonly setup: Setup;
  readonly focalLength35mm?: number | undefined;
  /** Of the camera. */
  readonly position: PositionSetup | null;
  /** Of the camera's axis, from true north. */
  readonly headingDeg: number | null;
}

/** Every pixel on the water: its area, and the way there and back. */
export interface Ground {
  readonly areaM2: Float32Array;
  /** To metres right and ahead of the camera, or east and north of it where the heading is known. */
  readonly mapping: GroundMapping;
}

/** The map laid on the water; null where the set-up does not say enough of the view. */
export function groundOf({ map, setup, focalLength35mm, headingDeg }: GroundFacts): Ground | null {
  const view = waterViewOf(setup, map, focalLength35mm);
  if (!view) return null;
  const areaM2 = groundAreaField(view);
  dropExcluded(areaM2, viewStatus(incidenceField(view)));
  const own: GroundMapping = {
    groundOf: (x, y) => groundAt(view, x, y),
    placeOf: (xM, yM) => placeOf(view, xM, yM),
  };
  return { areaM2, mapping: headingDeg === null ? own : turnedMapping(own, headingDeg) };
}

/** Null where the view is only half told. Seen straight down, a pixel's size is enough: the focal length changes angles, not places. */
function waterViewOf(
  setup: Setup,
  { width, height }: ThicknessMap,
  focalLength35mm: number | undefined,
): WaterView | null {
  if (!setup.view || missingOfView(setup.view, { width, height, focalLength35mm }).length > 0) return null;
  const whole = withPhotoFocal(setup, focalLength35mm === undefined ? {} : { focalLength35mm });
  const known = photoViewOf(whole, width, height);
  if (!known || known.pixelSizeM === null) return known?.view ?? null;
  return known.view ?? straightDownFromPixelSize(pinholeCamera(width, height, width), known.pixelSizeM);
}

/**
 * The slick's outline and one feature for each appearance code, as GeoJSON. Without position or heading the features keep
 * their areas and have null geometries (RFC 7946, section 3.2).
 */
export function slickGeoJson(
  { map, position, headingDeg }: GroundFacts,
  { areaM2, mapping }: Ground,
  common: Readonly<Record<string, JsonValue>>,
): string {
  const toPosition = (x: number, y: number) => {
    const ground = position && headingDeg !== null ? mapping.groundOf(x, y) : null;
    if (!ground || !position) return null;
    const { latitudeDeg, longitudeDeg } = offsetPosition(position, ground[0], ground[1]);
    return [longitudeDeg, latitudeDeg] as const;
  };
  const camera = position && ([position.longitudeDeg, position.latitudeDeg] as const);
  return writeGeoJson(slickFeatures({ map, areaM2, toPosition }, camera, common));
}

/**
 * Thickness in nanometres on a grid of square metres, NaN where there is none, as GeoTIFF: placed on the globe where
 * position and heading are known, else on a grid of its own that begins at the camera. Null where nothing lies on water.
 */
export function groundTiff(
  { map, position, headingDeg }: GroundFacts,
  { areaM2, mapping }: Ground,
): Uint8Array | null {
  const grid = gridFor(areaM2, map.width, map.height, mapping);
  if (!grid) return null;
  const { columns, rows, westM, northM, cellM } = grid;
  const values = onGround(map.thicknessNm, areaM2, map.width, map.height, mapping, grid);
  const system: GroundSystem =
    position && headingDeg !== null
      ? { kind: 'aboutPoint', latitudeDeg: position.latitudeDeg, longitudeDeg: position.longitudeDeg }
      : { kind: 'local' };
  const geo = { system, westM, northM, pixelM: cellM };
  return encodeFloatTiff({ width: columns, height: rows, values, geo, compression: 'deflate' });
}
