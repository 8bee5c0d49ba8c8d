import { orderBoundaries } from '../chart/orders.ts';
import { matrixMaker } from '../colour/cameraMatrix.ts';
import { FILM_WAVELENGTHS_NM } from '../colour/sampled.ts';
import type { ActivityMap } from '../match/activity.ts';
import { withCamera } from '../match/cameraKnowledge.ts';
import type { CameraModel } from '../match/cameraModel.ts';
import type { CodeChart } from '../match/codeChart.ts';
import { type CommonError, commonError } from '../match/commonError.ts';
import { type FilmBasis, type FilmScene, filmBasis, pathRatio, thinnedBasis } from '../match/filmBasis.ts';
import { type CameraFit, fitCamera } from '../match/fitCamera.ts';
import type { ReadingRules } from '../match/mapPixels.ts';
import { observerBasis } from '../match/observerBasis.ts';
import { AT, FIXED_CAMERA, type Prior, statedPrior } from '../match/parameters.ts';
import { sampleFilm } from '../match/sampleFilm.ts';
import type { PhotoPixels } from '../photo/types.ts';
import { planAngles } from './anglePlan.ts';
import { assumedIncidence } from './assumedIncidence.ts';
import type { FitReport, Notice } from './contract.ts';
import { describeFit } from './describeFit.ts';
import { drawCharts, OUTSIDE_FAMILY, scaleOf } from './drawCharts.ts';
import { fitInput } from './fitInput.ts';
import {
  fitWithFallback,
  LEAST_SPAN_KNOWN_NM,
  LEAST_SPAN_NM,
  type Outcome,
  spanOf,
} from './fitWithFallback.ts';
import { cameraOfFilm, type FittedCamera } from './keptCamera.ts';
import { isOtherCamera, keptName, knownCamera } from './knownCamera.ts';
import { photoViewOf } from './photoView.ts';
import { canBeBare, prepareScene } from './prepareScene.ts';
import { rulesFor, withBareLimits } from './readingRules.ts';
import { readReferences } from './references.ts';
import { resolvableRange } from './resolvable.ts';
import {
  angleCharts,
  cleanAngle,
  makeReader,
  nearestOf,
  type SeenAngles,
  usableFor,
  withBareRow,
} from './seenAngles.ts';
import { settledRanges } from './settledRanges.ts';
import type { Setup } from './setup.ts';
import { slantedOptics } from './slantedOptics.ts';
import { type Start, startGains } from './startGains.ts';
import { viewNoticesOf } from './viewSeen.ts';

/** All that is worked out once a photo before its pixels are read. Data only: it can go to a worker. */
export interface Calibration {
  /** One chart for each class of how lively a pixel's surroundings are, calmest first. */
  readonly charts: readonly CodeChart[];
  /** The charts at all angles of a photo with a view, and where its pixels look; `charts` is then that of their middle. */
  readonly angles: SeenAngles | null;
  readonly rules: ReadingRules;
  /** What all thicknesses have in common, at the angle of `charts`; the view's own doubts are not in it. */
  readonly common: CommonError;
  readonly orderBoundariesNm: readonly number[];
  readonly resolvableNm: { readonly fromNm: number; readonly toNm: number };
  readonly calibrated: boolean;
  readonly fit: FitReport | null;
  /** What the next photo of the same phone may start from; null where the film told nothing of the camera. */
  readonly camera: FittedCamera | null;
  readonly notices: readonly Notice[];
}

/** Thickness to which colours are sought when a set-up does not say: past the end of colour for every film here. */
const USUAL_MAX_NM = 1500;
/** The fit looks no further: colours past it do not tell one camera from another. */
const FIT_MAX_NM = 1500;
const FIT_STEP_NM = 2;
const SAMPLES = 3000;
/** Fitted covariances are widened by this: cameras are not exactly of the family (set on seeded scenes, `npm run validate`). */
const COVARIANCE_FACTOR = 2;
export type OnStep = (share: number, step: string) => void;

/**
 * Works out the chart for this photo: references, camera fit, orders, resolvable range.
 * @param leftOut pixels that take no part, one byte each; null for none
 * @param activity of the photo's blocks, see `activityMap`
 * @throws SetupError, PhotoError with a sentence that says what to do
 */
export function calibrate(
  pixels: PhotoPixels,
  setup: Setup,
  leftOut: Uint8Array | null,
  activity: ActivityMap,
  onStep: OnStep = () => {},
): Calibration {
  const prepared = prepareScene(setup);
  const { light } = prepared;
  const photoView = photoViewOf(setup, pixels.width, pixels.height);
  const plan = photoView?.view ? planAngles(photoView.view, prepared.scene.stack, leftOut) : null;
  const assumed = assumedIncidence(setup, photoView, prepared.scene);
  const scene = {
    ...prepared.scene,
    incidenceRad: plan?.referenceRad ?? assumed?.incidenceRad ?? prepared.scene.incidenceRad,
  };
  const marked = readReferences(pixels, setup);
  const notices: Notice[] = [
    ...marked.notices,
    ...(assumed?.notices ?? []),
    ...viewNoticesOf(photoView, leftOut),
  ];
  const maxNm = setup.maxThicknessNm ?? USUAL_MAX_NM;
  const asObserver = setup.camera === 'cie1931';
  const fits = !asObserver && !(typeof setup.camera === 'object' && !setup.camera.fit);
  onStep(0, 'computing the chart');
  const matrices = matrixMaker(light, pixels.encoding, FILM_WAVELENGTHS_NM);
  const makeBasis = (at: FilmScene, stepNm: number, count: number, wavelengthNm: Float64Array) =>
    asObserver
      ? observerBasis(at, light, pixels.encoding, stepNm, count, wavelengthNm)
      : filmBasis(at, light, stepNm, count, wavelengthNm);
  const modelOf = (basis: FilmBasis): CameraModel => ({
    basis,
    encoding: pixels.encoding,
    matrixFor: asObserver ? () => Float64Array.of(1, 0, 0, 0, 1, 0, 0, 0, 1) : matrices.matrixFor,
  });
  const slanted = plan
    ? slantedOptics(
        plan,
        photoView?.poses ?? null,
        scene,
        makeBasis,
        maxNm,
        FIT_MAX_NM,
        cleanAngle(plan, setup),
        setup.windMS ?? null,
      )
    : null;
  const fine = slanted ? null : makeBasis(scene, 1, Math.ceil(maxNm) + 1, FILM_WAVELENGTHS_NM);
  const fitCount = Math.floor(Math.min(Math.ceil(maxNm), FIT_MAX_NM) / FIT_STEP_NM) + 1;
  const coarse = modelOf(fine ? thinnedBasis(fine, FIT_STEP_NM, fitCount) : slanted!.fitBasis);
  const references = slanted ? withBareRow(marked, slanted.bareRow) : marked;
  const taken = sampleFilm(pixels, usableFor(leftOut, plan, pixels.width), SAMPLES);
  const placed = slanted ? slanted.place(taken, pixels.encoding) : null;
  const sample = placed?.sample ?? taken;
  const known = knownCamera(setup, coarse, notices);
  const start = startGains(coarse, sample, references, pixels, known);
  const spread = {
    index: scene.stack.film.indexSpread,
    mired: 'daylightK' in light ? 25 : 0,
  };
  const anyCamera = (at: Start) =>
    statedPrior({ ...spread, ...at.spread, ...(asObserver ? FIXED_CAMERA : {}) }, at.priorMean);
  const noise = sample.count > 0 ? sample.pixelNoise : Float64Array.of(2, 2, 2);
  const orders = orderBoundaries(scene.stack, scene.incidenceRad, maxNm);
  const chartsFor = (model: CameraModel, fit: CameraFit) =>
    drawCharts(model, fit, scene, noise, orders, { relative: assumed?.relativeSd ?? 0, brightness: 0 });
  const slantedCharts = (fit: CameraFit, every: number): SeenAngles | null =>
    slanted && {
      view: slanted.plan.view,
      referenceRad: scene.incidenceRad,
      charts: angleCharts(slanted, every, maxNm, (basis, at, sd, own) =>
        drawCharts(modelOf(basis), fit, at, noise, own, sd),
      ),
    };
  /** Fits from the starts, settles orders roughly with that camera, and fits once more. */
  const fitTwice = (prior: Prior, starts: readonly Float64Array[], leastSpanNm: number): Outcome => {
    onStep(0.1, 'fitting the camera');
    const input = { ...fitInput(coarse, prior, sample, references), allowed: placed?.allowed ?? null };
    const outcome = fitWithFallback(input, starts, fits, leastSpanNm);
    if (outcome.determined === 'no') return outcome;
    onStep(0.4, 'settling orders for the camera');
    const angles = slantedCharts(outcome.fit, 2);
    const rough = angles ? angles.charts.charts[0]! : chartsFor(coarse, outcome.fit);
    const allowed = settledRanges(
      pixels,
      sample,
      placed,
      makeReader(pixels, activity, { charts: rough, angles }),
      rough[0]!,
      rulesFor(setup, scene, Number.POSITIVE_INFINITY),
      leftOut,
    );
    onStep(0.5, 'fitting the camera once more');
    outcome.fit = fitCamera({ ...input, start: outcome.fit.parameters, near: true, allowed });
    outcome.spanNm = spanOf(outcome.fit.sampleNm);
    return outcome;
  };
  let prior = known ? withCamera(anyCamera(start), known) : anyCamera(start);
  let outcome = fitTwice(prior, start.starts, known ? LEAST_SPAN_KNOWN_NM : LEAST_SPAN_NM);
  const isOther = known !== null && isOtherCamera(setup, known, outcome.fit, notices);
  if (isOther) {
    const afresh = startGains(coarse, sample, references, pixels);
    prior = anyCamera(afresh);
    outcome = fitTwice(prior, afresh.starts, LEAST_SPAN_NM);
  }
  onStep(0.8, 'drawing the chart for this photo');
  const { fit: found, determined } = outcome;
  const camera =
    determined === 'no' ? null : cameraOfFilm(found, prior, COVARIANCE_FACTOR, pixels.encoding, determined);
  if (outcome.determined !== 'no') {
    const covariance = outcome.fit.covariance.map((v) => v * COVARIANCE_FACTOR);
    outcome.fit = { ...outcome.fit, covariance };
  }
  const seen = slantedCharts(outcome.fit, 1);
  const angles = seen && canBeBare(setup, scene.stack) ? withBareLimits(seen, pixels, leftOut) : seen;
  const middle = angles ? nearestOf(angles.charts.incidenceRad, scene.incidenceRad) : 0;
  const model = modelOf(fine ?? slanted!.basisAt(angles!.charts.incidenceRad[middle]!));
  const charts = angles?.charts.charts[middle] ?? chartsFor(model, outcome.fit);
  const factor = pathRatio(scene, outcome.fit.parameters[AT.index]!);
  const boundaries = orders.map((d) => d * factor);
  const chart = charts[0]!;
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
    charts,
    angles,
    rules: rulesFor(setup, scene, reachesEnd ? Number.POSITIVE_INFINITY : resolvable.toNm),
    common: commonError(
      model,
      outcome.fit,
      chart,
      scaleOf(scene, outcome.fit, Math.hypot(OUTSIDE_FAMILY, assumed?.relativeSd ?? 0)),
    ),
    orderBoundariesNm: boundaries,
    resolvableNm: resolvable,
    calibrated,
    fit: asObserver
      ? null
      : describeFit(
          outcome.fit,
          outcome.determined,
          prior,
          outcome.spanNm,
          setup,
          known && !isOther ? keptName(setup) : null,
        ),
    camera,
    notices,
  };
}
