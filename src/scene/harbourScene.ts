import type { Point, Rectangle, Setup } from '../engine/setup.ts';
import { filmStackFor } from '../optics/filmPresets.ts';
import type { SceneRequest } from './benchScenes.ts';
import { cameraOf, drawConditions, filmColours, filmTableOf, meter } from './conditions.ts';
import { developPhoto } from './develop.ts';
import { drawHarbourPlace, waterRegion, waterToPixel } from './harbour/harbourPlace.ts';
import { incidenceAtDeg, renderHarbour } from './harbour/waterView.ts';
import { horizonAt } from './perspective.ts';
import { seededRandom } from './random.ts';
import { regionMask } from './region.ts';
import type { Scene } from './types.ts';

export interface HarbourRequest extends SceneRequest {
  /** Clouds and a brighter zenith, which a reader's model does not have: 0 for an even sky, 1 for a look of life. */
  readonly skyUnevenness: number;
  /** Bright patch of sky whose glint sparkles on the far water. */
  readonly glint: boolean;
  readonly subsamples: number;
  readonly rippleWaves: number;
}

/** Farthest from the vertical that the marked region goes. */
const STEEPEST_DEG = 74;
const OIL_MAX_NM = 1000;

/**
 * A sheen in an invented harbour, seen at a slant from the quay. The true camera place is in `view`; what the reader is
 * told of it (height off by 5 %, pitch by 0.5 degrees, one standard deviation each) is in `toldView`.
 */
export function harbourScene(request: HarbourRequest): HarbourScene {
  const { width, height } = request;
  const random = seededRandom(`oil-harbour/${request.seed}`);
  const stack = filmStackFor('diesel');
  const place = drawHarbourPlace(
    {
      widthPx: width,
      heightPx: height,
      skyUnevenness: request.skyUnevenness,
      rippleWaves: request.rippleWaves,
    },
    random,
  );
  const { view } = place;
  const region = waterRegion(view, place.quayX, STEEPEST_DEG);
  const clean = bareRectangle(place.bare, view);
  const cleanIncidenceDeg = incidenceAtDeg(view, clean[0] + clean[2] / 2, clean[1] + clean[3] / 2);
  const drawn = drawConditions(
    random.fork('conditions'),
    stack,
    cleanIncidenceDeg,
    request.conditions,
    request.seed,
  );
  const camera = cameraOf(drawn, random);
  const table = filmTableOf(stack, drawn, camera, { maxNm: OIL_MAX_NM, stepNm: 1, fromDeg: 15, toDeg: 88 });
  const film = filmColours(table, STEEPEST_DEG, OIL_MAX_NM);
  const metered = meter(drawn, camera, film, film);
  const picture = renderHarbour({
    view,
    field: place.field,
    table,
    surroundings: place.surroundings,
    ripples: place.ripples,
    spots: place.spots,
    waterLight: [0, 0, 0],
    sun: request.glint ? place.sun : null,
    subsamples: request.subsamples,
  });
  const off = random.fork('told');
  const onHorizon = (share: number): Point => [
    Math.round(share * width),
    Math.round(horizonAt(view, share * width)),
  ];
  const toldView = {
    heightM: view.heightM * (1 + 0.05 * off.normal()),
    pitchDeg: (view.pitchRad * 180) / Math.PI + 0.5 * off.normal(),
    rollDeg: (view.rollRad * 180) / Math.PI,
    focal35mm: place.focal35mm,
    horizon: [onHorizon(0.15), onHorizon(0.85)] as const,
  };
  const setup: Setup = {
    film: 'diesel',
    light: { daylightK: drawn.toldDaylightK },
    camera: 'phone',
    references: { clean },
    region,
    view: {
      heightM: toldView.heightM,
      focal35mm: toldView.focal35mm,
      pitchDeg: toldView.pitchDeg,
      rollDeg: toldView.rollDeg,
    },
  };
  return {
    name: 'oil-harbour',
    filmKind: 'oil',
    width,
    height,
    codes: developPhoto(picture.raw, metered.development, random.fork('noise')),
    thicknessNm: picture.thicknessNm,
    kind: picture.kind,
    setup,
    drawn: metered.conditions,
    view,
    quayX: place.quayX,
    toldView,
    water: sumWater(picture, region, width, height),
  };
}

/** What the reader is told of the camera's place; names as in SETUP.json's `view`. */
export interface ToldView {
  readonly heightM: number;
  readonly pitchDeg: number;
  readonly rollDeg: number;
  readonly focal35mm: number;
  /** Two places on the horizon, to the nearest pixel, as two taps give them. */
  readonly horizon: readonly [Point, Point];
}

export type HarbourScene = Scene &
  Required<Pick<Scene, 'view' | 'water'>> & {
    readonly toldView: ToldView;
    /** Water lies to the right of this X, metres. */
    readonly quayX: number;
  };

/** The largest upright rectangle of whole pixels about the bare patch that stays within its inner part. */
function bareRectangle(
  [x, y, radius]: readonly [number, number, number],
  view: Parameters<typeof waterToPixel>[0],
): Rectangle {
  const half = 0.6 * radius;
  const places = [
    [x - half, y - half],
    [x + half, y - half],
    [x + half, y + half],
    [x - half, y + half],
  ].map(([px, py]) => waterToPixel(view, px!, py!)!);
  const left = Math.ceil(Math.max(places[0]![0], places[3]![0]));
  const right = Math.floor(Math.min(places[1]![0], places[2]![0]));
  const top = Math.ceil(Math.max(places[2]![1], places[3]![1]));
  const bottom = Math.floor(Math.min(places[0]![1], places[1]![1]));
  return [left, top, right - left, bottom - top];
}

/** Areas and volume of the water within the region. */
function sumWater(
  picture: {
    readonly areaM2: Float64Array;
    readonly oiledM2: Float64Array;
    readonly volumeNmM2: Float64Array;
  },
  region: readonly Point[],
  width: number,
  height: number,
) {
  let regionM2 = 0;
  let oiledM2 = 0;
  let volumeNmM2 = 0;
  regionMask(region, width, height).forEach((inside, pixel) => {
    if (inside === 1) {
      regionM2 += picture.areaM2[pixel]!;
      oiledM2 += picture.oiledM2[pixel]!;
      volumeNmM2 += picture.volumeNmM2[pixel]!;
    }
  });
  // 1 nm on 1 m2 is 1e-9 m3 = 1e-3 mL.
  return { regionM2, oiledM2, volumeMl: volumeNmM2 * 1e-3 };
}
