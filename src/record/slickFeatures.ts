import type { ThicknessMap } from '../match/types.ts';
import { APPEARANCE_CODE_VERSION, APPEARANCES } from '../tally/appearanceCode.ts';
import { appearanceRaster } from './appearanceRaster.ts';
import { outlines } from './contours.ts';
import type { GeoFeature, JsonValue, LonLat } from './geojson.ts';
import type { RingPoint, RingPolygon } from './rings.ts';

export interface SlickShape {
  readonly map: ThicknessMap;
  /** Water area of each pixel; 0 or NaN where it does not count. */
  readonly areaM2: Float32Array;
  /** From a picture place to the globe; null above the horizon. */
  readonly toPosition: (x: number, y: number) => LonLat | null;
  readonly atLeastCode?: 2 | 3;
}

/**
 * Features of a slick: its outline, one feature for each appearance code on it, and the camera. Outlines are drawn on a
 * grid of at most 512 cells a side, without speckle: the areas in their properties are the tally's, summed over pixels.
 * @param common properties of every feature (time, place of origin, version); positions belong in geometries only
 */
export function slickFeatures(
  { map, areaM2, toPosition, atLeastCode = 2 }: SlickShape,
  camera: LonLat | null,
  common: Readonly<Record<string, JsonValue>> = {},
): GeoFeature[] {
  const raster = appearanceRaster(map, atLeastCode, areaM2);
  const shapeOf = (holds: (code: number) => boolean) => {
    const mask = raster.map((code) => (holds(code) ? 1 : 0));
    return { polygons: outlines(mask, map.width, map.height).flatMap((p) => onGlobe(p, toPosition)) };
  };
  const areaOf = (holds: (code: number) => boolean) =>
    raster.reduce((sum, code, i) => (holds(code) ? sum + areaM2[i]! : sum), 0);
  const isOil = (code: number) => code > 0;
  const features: GeoFeature[] = [
    {
      id: 'slick',
      properties: { ...common, kind: 'slickOutline', areaM2: areaOf(isOil) },
      shape: shapeOf(isOil),
    },
  ];
  for (const { code, name, minUm, maxUm } of APPEARANCES.slice(0, 3)) {
    const isCode = (value: number) => value === code;
    const area = areaOf(isCode);
    if (area === 0) continue;
    features.push({
      id: `code-${code}`,
      properties: {
        ...common,
        kind: 'appearance',
        code,
        name,
        minUm,
        maxUm,
        codeVersion: APPEARANCE_CODE_VERSION,
        areaM2: area,
      },
      shape: shapeOf(isCode),
    });
  }
  features.push({
    id: 'camera',
    properties: { ...common, kind: 'camera' },
    shape: camera && { point: camera },
  });
  return features;
}

/** The polygon's points on the globe; what lies above the horizon is left out. */
function onGlobe(
  { outer, holes }: RingPolygon,
  toPosition: (x: number, y: number) => LonLat | null,
): RingPolygon[] {
  const moved = (ring: readonly RingPoint[]) =>
    ring.flatMap(([x, y]): LonLat[] => {
      const place = toPosition(x, y);
      return place ? [place] : [];
    });
  const shell = moved(outer);
  return shell.length > 2
    ? [{ outer: shell, holes: holes.map(moved).filter((ring) => ring.length > 2) }]
    : [];
}
