import { FILM_WAVELENGTHS_NM } from '../colour/sampled.ts';
import { blurredReflectanceTable } from '../optics/blur.ts';
import type { FilmStack } from '../optics/types.ts';
import { withIndexShift } from '../optics/withIndexShift.ts';
import type { Development } from './develop.ts';
import { buildFilmTable, type FilmTable } from './filmTable.ts';
import { MEASURED_SENSORS, measuredSensorOf } from './measuredSensors.ts';
import type { Random } from './random.ts';
import { type SceneCamera, sceneCamera } from './sceneCamera.ts';
import { drawFilmic, drawSigmoid } from './toneCurve.ts';
import type { DrawnConditions } from './types.ts';

/** Which draws a scene makes. `STATED` are the conditions that the project's figures are set for. */
export interface ConditionOptions {
  readonly sensor: 'family' | 'outside' | 'measured';
  readonly tone: 'none' | 'sigmoid' | 'filmic';
  /** Gains, veil, light and index as drawn, or all exactly as the reader is told. */
  readonly errors: 'drawn' | 'none';
  readonly noiseCodes: number;
  /** One standard deviation of thickness inside a pixel, as a share. */
  readonly relativeThicknessSpread: number;
}

export const STATED: ConditionOptions = {
  sensor: 'family',
  tone: 'sigmoid',
  errors: 'drawn',
  noiseCodes: 2,
  relativeThicknessSpread: 0,
};

/** Named sets of conditions: the stated one, and harder ones that show where the reading stops being good. */
export const CONDITIONS = {
  stated: STATED,
  /** A tone curve that is not symmetric. */
  filmic: { ...STATED, tone: 'filmic' },
  /** Sensors that are not in the family. */
  outside: { ...STATED, sensor: 'outside' },
  /** Sensors that others measured, one after another by the seed. */
  measured: { ...STATED, sensor: 'measured' },
  /** Thickness varies by 4 % inside a pixel. */
  blurred: { ...STATED, relativeThicknessSpread: 0.04 },
} as const satisfies Record<string, ConditionOptions>;
export type ConditionName = keyof typeof CONDITIONS;

/** Everything drawn but the exposure and the veil, which depend on what is in the picture. */
export type EarlyDraws = Omit<DrawnConditions, 'exposure' | 'veil'> & {
  readonly toldDaylightK: number;
  readonly veilShare: readonly [number, number, number];
  readonly targetLevel: number;
};

const DAYLIGHT_K = [5000, 12000] as const;
const TOLD_OFF_K = 1500;

/** Draws a camera, a light and a film index. `incidenceDeg` is taken as given; `seed` names the measured camera. */
export function drawConditions(
  random: Random,
  stack: FilmStack,
  incidenceDeg: number,
  options: ConditionOptions,
  seed: number | string,
): EarlyDraws {
  const exact = options.errors === 'none';
  const daylightK = random.uniform(...DAYLIGHT_K);
  const off = random.uniform(-TOLD_OFF_K, TOLD_OFF_K);
  const coefficients = Array.from({ length: 9 }, () => random.normal());
  const gain = () => random.uniform(0.9, 1.1);
  const gains: [number, number, number] = [gain(), gain(), gain()];
  const gainStage = random.next() < 0.5 ? 'sensor' : 'output';
  const veilSize = random.uniform(0, 0.03);
  const veilColour = [random.uniform(0.4, 1), random.uniform(0.4, 1), random.uniform(0.4, 1)];
  const brightest = Math.max(...veilColour);
  const veil = (c: number) => (exact ? 0 : (veilSize * veilColour[c]!) / brightest);
  const indexShift = stack.film.indexSpread * random.normal();
  const tone = options.tone === 'filmic' ? drawFilmic(random) : drawSigmoid(random);
  return {
    sensor: options.sensor,
    ...(options.sensor === 'measured' ? { measuredSensor: measuredSensorOf(seed).name } : {}),
    coefficients: options.sensor === 'family' ? coefficients : [],
    gains: exact ? [1, 1, 1] : gains,
    gainStage,
    tone: options.tone === 'none' ? { shape: 'none' } : tone,
    daylightK,
    toldDaylightK: exact ? daylightK : Math.round(Math.max(4000, daylightK + off) / 50) * 50,
    indexError: exact ? 0 : indexShift,
    presetIndex: stack.film.refractiveIndex(589.3),
    incidenceDeg,
    noiseCodes: options.noiseCodes,
    relativeThicknessSpread: options.relativeThicknessSpread,
    veilShare: [veil(0), veil(1), veil(2)],
    targetLevel: random.uniform(0.6, 0.85),
  };
}

/** The camera that was drawn, under the light that was drawn. */
export function cameraOf(drawn: EarlyDraws, random: Random): SceneCamera {
  const measured = MEASURED_SENSORS.find(({ name }) => name === drawn.measuredSensor);
  return sceneCamera(
    drawn.sensor === 'outside' ? 'outside' : (measured ?? drawn.coefficients),
    drawn.daylightK,
    random.fork('camera'),
  );
}

/** Raw values of the film with the index that was drawn, over a range of angles of incidence. */
export function filmTableOf(
  stack: FilmStack,
  drawn: EarlyDraws,
  camera: SceneCamera,
  range: {
    readonly maxNm: number;
    readonly stepNm: number;
    readonly fromDeg: number;
    readonly toDeg: number;
  },
): FilmTable {
  const count = Math.ceil(range.maxNm / range.stepNm) + 2;
  const thicknessNm = Float64Array.from({ length: count }, (_, i) => i * range.stepNm);
  const trueStack = { ...stack, film: withIndexShift(stack.film, drawn.indexError) };
  const blur = { incidence: null, relativeThicknessSpread: drawn.relativeThicknessSpread };
  const scratch = new Float64Array(count * FILM_WAVELENGTHS_NM.length);
  const rad = Math.PI / 180;
  return buildFilmTable({
    reflectanceAt: (incidenceRad) =>
      blurredReflectanceTable(
        trueStack,
        { thicknessNm, wavelengthNm: FILM_WAVELENGTHS_NM, incidenceRad, polarisation: 'unpolarised' },
        blur,
        scratch,
      ),
    stepNm: range.stepNm,
    count,
    rawWeights: camera.rawWeights,
    fromRad: range.fromDeg * rad,
    toRad: range.toDeg * rad,
    angleStepRad: rad,
  });
}

/**
 * Sets exposure and veil for a picture: its brightest film (or card) lands on the drawn level, and the veil is the drawn
 * share of that film. `brightestRaw` and `filmRaw` hold raw values of the brightest thing metered and of the brightest film.
 */
export function meter(
  drawn: EarlyDraws,
  camera: SceneCamera,
  meteredRaw: readonly ArrayLike<number>[],
  filmRaw: readonly ArrayLike<number>[],
): { readonly development: Development; readonly conditions: DrawnConditions } {
  const matrix = new Float64Array(9);
  for (let row = 0; row < 3; row++) {
    for (let column = 0; column < 3; column++) {
      const gain = drawn.gains[drawn.gainStage === 'sensor' ? column : row]!;
      matrix[3 * row + column] = camera.matrix[3 * row + column]! * gain;
    }
  }
  const brightest = (colours: readonly ArrayLike<number>[]) => {
    let most = 0;
    for (const raw of colours) {
      for (let c = 0; c < 3; c++) {
        const level = matrix[3 * c]! * raw[0]! + matrix[3 * c + 1]! * raw[1]! + matrix[3 * c + 2]! * raw[2]!;
        most = Math.max(most, level);
      }
    }
    return most;
  };
  const exposure = drawn.targetLevel / brightest(meteredRaw);
  const filmLevel = exposure * brightest(filmRaw);
  const veil = [0, 1, 2].map((c) => drawn.veilShare[c]! * filmLevel) as [number, number, number];
  const { toldDaylightK: _told, veilShare: _share, targetLevel: _target, ...rest } = drawn;
  return {
    development: { matrix, exposure, veil, tone: drawn.tone, noiseCodes: drawn.noiseCodes },
    conditions: { ...rest, exposure, veil },
  };
}

/** Raw colours of the film at all tabulated thicknesses at one angle, every few nanometres. */
export function filmColours(table: FilmTable, incidenceDeg: number, maxNm: number): Float64Array[] {
  const colours: Float64Array[] = [];
  for (let nm = 0; nm <= maxNm; nm += 5) {
    const raw = new Float64Array(3);
    table.lookUp(nm, (incidenceDeg * Math.PI) / 180, raw);
    colours.push(raw);
  }
  return colours;
}
