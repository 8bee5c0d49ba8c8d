import type { FilmPreset, Point, Rectangle, Setup } from '../engine/setup.ts';
import { filmStackFor } from '../optics/filmPresets.ts';
import { type ConditionOptions, filmColours, filmTableOf, meter } from './conditions.ts';
import { developPhoto } from './develop.ts';
import { drawOilLens, oilLensField } from './fields/oilLens.ts';
import { drawOilSheen, oilSheenField } from './fields/oilSheen.ts';
import { drawSoapFilm, soapFilmField } from './fields/soapFilm.ts';
import type { ThicknessField } from './fields/thicknessField.ts';
import { type Box, renderFlatWater, renderFrame } from './framePicture.ts';
import { drawPhone, type PhoneRequest, squeezed } from './phone.ts';
import { seededRandom } from './random.ts';
import type { Scene } from './types.ts';

/** Size in pixels, seed and conditions of a scene; the same request gives the same bytes. */
export interface SceneRequest extends PhoneRequest {
  readonly width: number;
  readonly height: number;
  readonly seed: number | string;
  readonly conditions: ConditionOptions;
}

const SOAP_MAX_NM = 1250;
const OIL_MAX_NM = 1000;
const FRAME: Box = [0.06, 0.05, 0.66, 0.9];
const CARD: Box = [0.79, 0.36, 0.15, 0.26];
/** Films that lie on water in the scenes; drawn with equal chance. */
const OILS: readonly FilmPreset[] = ['diesel', 'lubricatingOil', 'kerosene', 'vegetableOil', 'lightCrude'];

/** A box in shares of the picture as whole pixels, `inset` of its sides cut off all round. */
export function boxInPixels(box: Box, width: number, height: number, inset: number): Rectangle {
  const cut = inset * Math.min(box[2] * width, box[3] * height);
  const left = Math.ceil(box[0] * width + cut);
  const top = Math.ceil(box[1] * height + cut);
  return [
    left,
    top,
    Math.floor((box[0] + box[2]) * width - cut) - left,
    Math.floor((box[1] + box[3]) * height - cut) - top,
  ];
}

/** The corners of a rectangle, clockwise from the top left. */
export function corners([x, y, width, height]: Rectangle): Point[] {
  return [
    [x, y],
    [x + width, y],
    [x + width, y + height],
    [x, y + height],
  ];
}

/**
 * A draining soap film in a wire frame, a neutral grey card beside it. The reader is told the film, a daylight, the
 * frame's inside, the card and the angle; in two scenes of three also the card's reflectance.
 */
export function soapScene(request: SceneRequest, black: boolean): Scene {
  const { width, height } = request;
  const name = black ? 'soap-black-film' : 'soap-draining';
  const random = seededRandom(`${name}/${request.seed}`);
  const stack = filmStackFor('soap');
  const draw = random.fork('set-up');
  const incidenceDeg = Math.round(draw.uniform(0, 20));
  const cardReflectance = Math.round(draw.uniform(0.04, 0.1) * 1000) / 1000;
  const cardStated = draw.next() < 2 / 3;
  const { drawn, camera } = drawPhone(random, stack, incidenceDeg, request);
  const table = filmTableOf(stack, drawn, camera, {
    maxNm: SOAP_MAX_NM,
    stepNm: 0.5,
    fromDeg: incidenceDeg,
    toDeg: incidenceDeg,
  });
  const film = filmColours(table, incidenceDeg, SOAP_MAX_NM);
  const metered = meter(drawn, camera, [...film, Array(3).fill(cardReflectance)], film);
  const whole = soapFilmField(
    drawSoapFilm(random.fork('film'), black, (FRAME[2] * width) / (FRAME[3] * height)),
    random.fork('film shape'),
  );
  const field = squeezed(whole, SOAP_MAX_NM, request.spanNm);
  const picture = renderFrame({
    width,
    height,
    field,
    table,
    incidenceRad: (incidenceDeg * Math.PI) / 180,
    frame: FRAME,
    cornerShare: 0,
    card: CARD,
    cardReflectance,
    cardTurnRad: 0,
    seed: 5,
    subsamples: 1,
  });
  const setup: Setup = {
    film: 'soap',
    light: { daylightK: drawn.toldDaylightK },
    camera: 'phone',
    references: {
      white: boxInPixels(CARD, width, height, 0.1),
      ...(cardStated ? { whiteReflectance: cardReflectance } : {}),
    },
    incidenceDeg,
    region: corners(boxInPixels(FRAME, width, height, 0)),
  };
  return {
    name,
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

/** Oil on water at one angle all over the picture; the reader is told a rectangle of bare water. */
export function oilScene(request: SceneRequest, shape: 'sheen' | 'lens'): Scene {
  const { width, height } = request;
  const name = `oil-${shape}`;
  const random = seededRandom(`${name}/${request.seed}`);
  const draw = random.fork('set-up');
  const preset = OILS[Math.floor(OILS.length * draw.next())]!;
  const incidenceDeg = Math.round(draw.uniform(0, 40));
  const stack = filmStackFor(preset);
  const { drawn, camera } = drawPhone(random, stack, incidenceDeg, request);
  const table = filmTableOf(stack, drawn, camera, {
    maxNm: OIL_MAX_NM,
    stepNm: 0.5,
    fromDeg: incidenceDeg,
    toDeg: incidenceDeg,
  });
  const film = filmColours(table, incidenceDeg, OIL_MAX_NM);
  const metered = meter(drawn, camera, film, film);
  const shaped = random.fork('film');
  const whole: ThicknessField =
    shape === 'sheen'
      ? oilSheenField(drawOilSheen(shaped), random.fork('film shape'))
      : oilLensField(drawOilLens(shaped), random.fork('film shape'));
  const field = squeezed(whole, OIL_MAX_NM, request.spanNm);
  const picture = renderFlatWater(field, table, (incidenceDeg * Math.PI) / 180, width, height);
  const clean: Box = shape === 'sheen' ? [0.03, 0.8, 0.14, 0.16] : [0.02, 0.02, 0.16, 0.16];
  const setup: Setup = {
    film: preset,
    light: { daylightK: drawn.toldDaylightK },
    camera: 'phone',
    references: { clean: boxInPixels(clean, width, height, 0) },
    incidenceDeg,
  };
  return {
    name,
    filmKind: 'oil',
    width,
    height,
    codes: developPhoto(picture.raw, metered.development, random.fork('noise')),
    thicknessNm: picture.thicknessNm,
    kind: picture.kind,
    setup,
    drawn: metered.conditions,
  };
}
