import { orderBoundaries, orderOf } from '../chart/orders.ts';
import { matrixMaker } from '../colour/cameraMatrix.ts';
import { FILM_WAVELENGTHS_NM } from '../colour/sampled.ts';
import { buildCodeChart } from '../match/buildCodeChart.ts';
import type { CameraModel } from '../match/cameraModel.ts';
import type { CodeChart } from '../match/codeChart.ts';
import { filmBasis, pathRatio } from '../match/filmBasis.ts';
import { type CameraFit, fitCamera } from '../match/fitCamera.ts';
import type { ReadingRules } from '../match/mapPixels.ts';
import { observerBasis } from '../match/observerBasis.ts';
import { AT, FIXED_CAMERA, type Prior, statedPrior } from '../match/parameters.ts';
import { type FilmSample, SAMPLE_VARIANCE_SHARE, sampleFilm } from '../match/sampleFilm.ts';
import type { PhotoPixels } from '../photo/types.ts';
import type { FitReport, Notice } from './contract.ts';
import { describeFit } from './describeFit.ts';
import { canBeBare, prepareScene } from './prepareScene.ts';
import { type References, readReferences } from './references.ts';
import { resolvableRange } from './resolvable.ts';
import type { Setup } from './setup.ts';
import { startGains } from './startGains.ts';

/** All that is worked out once a photo before its pixels are read. Data only: it can go to a worker. */
export interface Calibration {
  readonly chart: CodeChart;
  readonly rules: ReadingRules;
  readonly orderBoundariesNm: readonly number[];
  readonly resolvableNm: { readonly fromNm: number; readonly toNm: number };
  readonly calibrated: boolean;
  readonly fit: FitReport | null;
  readonly notices: readonly Notice[];
}

/** Thickness to which colours are sought when a set-up does not say: past the end of colour for every film here. */
const USUAL_MAX_NM = 2000;
/** The fit looks no further: colours past it do not tell one camera from another. */
const FIT_MAX_NM = 1500;
const FIT_STEP_NM = 2;
const SAMPLES = 3000;
/** What a chart colour itself may be off after the fit, codes of 255. */
const CHART_ERROR = 1.5;
/** Share of its weight that a sample keeps, because samples share errors of compression and processing. */
const SAMPLE_WEIGHT = 0.1;
/** Squared distance (in noise) of colours that are no film: about 18 codes. */
const OUTLIER_DISTANCE = 100;
/** Oil thinner than this cannot be told from bare water by eye or camera (the codes start at 40 nm). */
const BARE_NM = 8;
const AMBIGUITY_MARGIN = 0.7;

export type OnStep = (share: number, step: string) => void;

/**
 * Works out the chart for this photo: references, camera fit, orders, resolvable range.
 * @param leftOut pixels that take no part, one byte each; null for none
 * @throws SetupError, PhotoError with a sentence that says what to do
 */
export function calibrate(
  pixels: PhotoPixels,
  setup: Setup,
  leftOut: Uint8Array | null,
  onStep: OnStep = () => {},
): Calibration {
  const { scene, light } = prepareScene(setup);
  const references = readReferences(pixels, setup);
  const notices: Notice[] = [...references.notices];
  const maxNm = setup.maxThicknessNm ?? USUAL_MAX_NM;
  const asObserver = setup.camera === 'cie1931';
  const fits = !asObserver && !(typeof setup.camera === 'object' && !setup.camera.fit);
  onStep(0, 'computing the chart');
  const matrices = matrixMaker(light, pixels.encoding, FILM_WAVELENGTHS_NM);
  const modelAt = (stepNm: number, count: number): CameraModel => ({
    basis: asObserver
      ? observerBasis(scene, light, pixels.encoding, stepNm, count, FILM_WAVELENGTHS_NM)
      : filmBasis(scene, light, stepNm, count, FILM_WAVELENGTHS_NM),
    encoding: pixels.encoding,
    matrixFor: asObserver ? () => Float64Array.of(1, 0, 0, 0, 1, 0, 0, 0, 1) : matrices.matrixFor,
  });
  const coarse = modelAt(FIT_STEP_NM, Math.ceil(Math.min(maxNm, FIT_MAX_NM) / FIT_STEP_NM) + 1);
  const usable = leftOut ? leftOut.map((v) => (v === 0 ? 1 : 0)) : null;
  const sample = sampleFilm(pixels, usable, SAMPLES);
  const start = startGains(coarse, sample, references, pixels);
  const spread = {
    ...start.spread,
    index: scene.stack.film.indexSpread,
    mired: 'daylightK' in light ? 25 : 0,
  };
  const prior = statedPrior(asObserver ? { ...spread, ...FIXED_CAMERA } : spread, start.priorMean);
  onStep(0.1, 'fitting the camera');
  const outcome = fitWithFallback(coarse, prior, start.starts, sample, references, fits);
  onStep(0.8, 'drawing the chart for this photo');
  const fine = modelAt(1, Math.ceil(maxNm) + 1);
  const shift = outcome.fit.parameters[AT.index]!;
  const n = scene.stack.film.refractiveIndex(550);
  const factor = pathRatio(scene, shift);
  const boundaries = orderBoundaries(scene.stack, scene.incidenceRad, maxNm).map((d) => d * factor);
  const noise = sample.count > 0 ? sample.pixelNoise : Float64Array.of(2, 2, 2);
  const chart = buildCodeChart(
    fine,
    outcome.fit,
    { codes: [noise[0]!, noise[1]!, noise[2]!], chartError: CHART_ERROR },
    { factor, perIndex: -1 / (n + shift), relativeSd: 0 },
    (d) => orderOf(d, boundaries),
  );
  const resolvable = resolvableRange(chart);
  const reachesEnd = resolvable.toNm >= chart.thicknessNm[chart.count - 1]! - 1;
  const calibrated = references.clean !== null || references.white !== null || start.byBrightBand;
  if (!calibrated) {
    notices.push({
      code: 'uncalibrated',
      text: 'No reference is marked, so this reading is uncalibrated: mark bare surface beside the film, or a grey card.',
    });
  }
  return {
    chart,
    rules: {
      outlierDistance: OUTLIER_DISTANCE,
      bareNm: canBeBare(setup, scene.stack) ? BARE_NM : 0,
      resolvableNm: reachesEnd ? Number.POSITIVE_INFINITY : resolvable.toNm,
      ambiguityMargin: AMBIGUITY_MARGIN,
    },
    orderBoundariesNm: boundaries,
    resolvableNm: resolvable,
    calibrated,
    fit: asObserver ? null : describeFit(outcome.fit, outcome.determined, prior, outcome.spanNm, setup),
    notices,
  };
}

interface Outcome {
  readonly fit: CameraFit;
  readonly determined: FitReport['determined'];
  readonly spanNm: readonly [number, number];
}

/** Fits from each start, keeps the likeliest; falls back to the references alone where the film says too little. */
function fitWithFallback(
  model: CameraModel,
  prior: Prior,
  starts: readonly Float64Array[],
  sample: FilmSample,
  references: References,
  fits: boolean,
): Outcome {
  const base = {
    model,
    prior,
    sampleWeight: SAMPLE_WEIGHT,
    references: references.evidence,
    sampleSd: sampleSd(sample),
  };
  const alone = () => fitCamera({ ...base, start: starts[0]!, samples: new Float64Array(0) });
  if (!fits || sample.count < 60) return { fit: alone(), determined: 'no', spanNm: [0, 0] };
  let best: CameraFit | null = null;
  if (starts.length > 1) {
    const few = sample.codes.subarray(0, 3 * Math.min(sample.count, 700));
    for (const start of starts) {
      const fit = fitCamera({ ...base, start, samples: few });
      if (!best || fit.objective < best.objective) best = fit;
    }
  }
  const fit = fitCamera({ ...base, start: best?.parameters ?? starts[0]!, samples: sample.codes });
  const spanNm = spanOf(fit.sampleNm);
  const width = spanNm[1] - spanNm[0];
  if (fit.filmShare < 0.3 || width < 120) return { fit: alone(), determined: 'no', spanNm };
  return { fit, determined: width > 400 && fit.filmShare > 0.7 ? 'well' : 'partly', spanNm };
}

function sampleSd(sample: FilmSample): number {
  const noise = Math.hypot(...sample.pixelNoise) / Math.sqrt(3);
  return Math.hypot(noise * Math.sqrt(SAMPLE_VARIANCE_SHARE), 1.2);
}

function spanOf(sampleNm: Float64Array): readonly [number, number] {
  const film = sampleNm.filter((d) => !Number.isNaN(d)).sort();
  if (film.length === 0) return [0, 0];
  return [film[Math.floor(0.02 * film.length)]!, film[Math.floor(0.98 * (film.length - 1))]!];
}
