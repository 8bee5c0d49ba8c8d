import type { Setup } from '../engine/setup.ts';
import { filmStackFor } from '../optics/filmPresets.ts';
import { boxInPixels, corners } from './benchScenes.ts';
import { cameraOf, drawConditions, filmColours, filmTableOf, meter, STATED } from './conditions.ts';
import { developPhoto } from './develop.ts';
import { drawSoapFilm, soapFilmField } from './fields/soapFilm.ts';
import { type Box, renderFrame } from './framePicture.ts';
import { waterRegion } from './harbour/harbourPlace.ts';
import { type HarbourScene, harbourScene } from './harbourScene.ts';
import { seededRandom } from './random.ts';
import type { Scene } from './types.ts';

/** Size of both demo photos: what a phone held upright gives, at a size that loads quickly. */
export const DEMO_SIZE = { width: 1200, height: 1600 } as const;

export interface DemoSize {
  readonly width: number;
  readonly height: number;
}

/** Incidence up to which the harbour demo is marked: beyond, bare water and thin film look too much alike. */
const MARKED_TO_DEG = 60;

/**
 * The harbour demo: sheen drifting along a quay wall. The draw was picked for its looks among two dozen. Its set-up marks
 * the near water and says where the camera stood, its height to a decimetre, as somebody on that quay would know it.
 */
export function demoHarbour(size: DemoSize = DEMO_SIZE): HarbourScene {
  const scene = harbourScene({
    ...size,
    seed: 'demo112',
    conditions: STATED,
    skyUnevenness: 0.6,
    glint: true,
    subsamples: 2,
    rippleWaves: 28,
  });
  const region = waterRegion(scene.view, scene.quayX, MARKED_TO_DEG);
  const { incidenceDeg: _, ...setup } = scene.setup;
  const heightM = Math.round(10 * scene.view.heightM) / 10;
  return {
    ...scene,
    name: 'harbour',
    setup: { ...setup, region, view: { heightM, horizon: scene.toldView.horizon } },
  };
}

const FRAME: Box = [0.1, 0.14, 0.58, 0.74];
const CARD: Box = [0.755, 0.43, 0.17, 0.145];

/** The soap film demo: an hour-old film in a wire frame, black film on top, plumes rising at its margins. */
export function demoSoapFilm(size: DemoSize = DEMO_SIZE): Scene {
  const { width, height } = size;
  const random = seededRandom('soap-film/demo7');
  const stack = filmStackFor('soap');
  const incidenceDeg = 8;
  const cardReflectance = 0.06;
  const drawn = drawConditions(random.fork('conditions'), stack, incidenceDeg, STATED, 'demo');
  const camera = cameraOf(drawn, random);
  const table = filmTableOf(stack, drawn, camera, {
    maxNm: 1250,
    stepNm: 0.5,
    fromDeg: incidenceDeg,
    toDeg: incidenceDeg,
  });
  const film = filmColours(table, incidenceDeg, 1250);
  const metered = meter(drawn, camera, [...film, Array(3).fill(cardReflectance)], film);
  const aspect = (FRAME[2] * width) / (FRAME[3] * height);
  const picture = renderFrame({
    width,
    height,
    field: soapFilmField(
      {
        ...drawSoapFilm(random.fork('film'), true, aspect),
        topNm: 95,
        bottomNm: 1080,
        blackShare: 0.12,
        blackNm: 14,
      },
      random.fork('film shape'),
    ),
    table,
    incidenceRad: (incidenceDeg * Math.PI) / 180,
    frame: FRAME,
    cornerShare: 0.07,
    card: CARD,
    cardReflectance,
    cardTurnRad: 0.045,
    seed: 5,
    subsamples: 2,
  });
  const setup: Setup = {
    film: 'soap',
    light: { daylightK: drawn.toldDaylightK },
    camera: 'phone',
    references: { white: boxInPixels(CARD, width, height, 0.12), whiteReflectance: cardReflectance },
    incidenceDeg,
    region: corners(boxInPixels(FRAME, width, height, 0.025)),
  };
  return {
    name: 'soap-film',
    filmKind: 'soap',
    width,
    height,
    codes: developPhoto(picture.raw, metered.development, random.fork('noise')),
    thicknessNm: picture.thicknessNm,
    kind: picture.kind,
    setup,
    drawn: metered.conditions,
  };
}
