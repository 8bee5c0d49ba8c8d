import sharp from 'sharp';
import { SRGB } from '../../colour/rgb.ts';
import type { EstimateResult } from '../../engine/contract.ts';
import type { Setup } from '../../engine/setup.ts';
import { PIXEL_STATUS } from '../../match/types.ts';
import type { PhotoPixels } from '../../photo/types.ts';
import { SCENES, type SceneName } from '../../scene/catalogue.ts';
import { CONDITIONS, type ConditionName } from '../../scene/conditions.ts';
import { regionMask } from '../../scene/region.ts';
import { type DrawnConditions, type Scene, TRUE_KIND } from '../../scene/types.ts';
import { type ErrorSample, sampleErrors } from './statistics.ts';
import { nearSteps } from './steps.ts';
import { type TalliedEstimate, type TallyReading, tallyScene } from './tallyScene.ts';

/** One photo to render, read and compare. */
export interface SceneTask {
  readonly scene: SceneName;
  readonly conditions: ConditionName;
  readonly seed: number;
  readonly width: number;
  readonly height: number;
}

/** What the reader made of it. Sent between processes: data only. */
export interface SceneReading {
  readonly task: SceneTask;
  readonly filmKind: 'soap' | 'oil';
  /** As read, and with the index error divided out of the truth. */
  readonly raw: ErrorSample;
  readonly indexDivided: ErrorSample;
  /** Bare pixels, and the share of them read as bare or as a film of at most 20 nm. */
  readonly barePixels: number;
  readonly bareHeld: number;
  /** Pixels of other things, and the share of them that got a thickness all the same. */
  readonly otherPixels: number;
  readonly otherGivenThickness: number;
  /** Film pixels near a step of thickness (`nearSteps`), those off by more than 50 nm, and those that are both. */
  readonly nearStepPixels: number;
  readonly farOffPixels: number;
  readonly farOffNearStep: number;
  readonly drawn: DrawnConditions;
  readonly setup: Setup;
  readonly fit: EstimateResult['summary']['fit'];
  readonly estimateMs: number;
  /** How much there is, on scenes over level water; null elsewhere. */
  readonly tally: TallyReading | null;
  readonly timingsMs: Readonly<Record<string, number>>;
}

export type Estimator = (pixels: PhotoPixels, setup: Setup, clock: () => number) => TalliedEstimate;

/** The estimator, or null where this build has none. */
export async function loadEstimator(): Promise<Estimator | null> {
  try {
    const { estimate } = await import('../../engine/estimate.ts');
    return estimate;
  } catch (error) {
    if (error instanceof Error && 'code' in error && error.code === 'ERR_MODULE_NOT_FOUND') {
      return null;
    }
    throw error;
  }
}

/** Codes after JPEG quality 90 with 4:2:0, as phones write it. */
export async function throughJpeg(codes: Uint8Array, width: number, height: number): Promise<Uint8Array> {
  const jpeg = await sharp(codes, { raw: { width, height, channels: 3 } })
    .jpeg({ quality: 90, chromaSubsampling: '4:2:0' })
    .toBuffer();
  return new Uint8Array(await sharp(jpeg).raw().toBuffer());
}

/**
 * Factor on the true thickness that the reader would see with a perfect camera but the preset's index: the optical path
 * d sqrt(n^2 - sin^2 theta) is what the colours fix.
 */
export function opticalPathRatio(drawn: DrawnConditions): number {
  const sine2 = Math.sin((drawn.incidenceDeg * Math.PI) / 180) ** 2;
  return Math.sqrt(((drawn.presetIndex + drawn.indexError) ** 2 - sine2) / (drawn.presetIndex ** 2 - sine2));
}

/** Renders, compresses and reads one scene, and compares with the truth. */
export async function readScene(task: SceneTask, estimate: Estimator): Promise<SceneReading> {
  const scene: Scene = SCENES[task.scene]({
    width: task.width,
    height: task.height,
    seed: task.seed,
    conditions: CONDITIONS[task.conditions],
  });
  const { width, height } = scene;
  const codes = await throughJpeg(scene.codes, width, height);
  const pixels: PhotoPixels = { width, height, codes, channels: 3, maxCode: 255, encoding: SRGB };
  const started = performance.now();
  const result = estimate(pixels, scene.setup, () => performance.now());
  const estimateMs = performance.now() - started;
  const { map, summary } = result;

  const inRegion = regionMask(scene.setup.region, width, height);
  const isFilm = new Uint8Array(width * height);
  const nearStep = nearSteps(scene.thicknessNm, width, height);
  const counts = { bare: 0, bareHeld: 0, other: 0, otherGiven: 0, nearStep: 0, farOff: 0, farOffNearStep: 0 };
  for (let i = 0; i < isFilm.length; i++) {
    if (inRegion[i] !== 1) {
      continue;
    }
    const nm = map.thicknessNm[i]!;
    switch (scene.kind[i]) {
      case TRUE_KIND.film:
        isFilm[i] = 1;
        counts.nearStep += nearStep[i]!;
        if (Math.abs(nm - scene.thicknessNm[i]!) > 50) {
          counts.farOff++;
          counts.farOffNearStep += nearStep[i]!;
        }
        break;
      case TRUE_KIND.bare:
        counts.bare++;
        counts.bareHeld += map.status[i] === PIXEL_STATUS.bare || nm <= 20 ? 1 : 0;
        break;
      default:
        counts.other++;
        counts.otherGiven += nm > 0 ? 1 : 0;
    }
  }
  const compared = {
    trueNm: scene.thicknessNm,
    isFilm,
    thicknessNm: map.thicknessNm,
    lowNm: map.lowNm,
    highNm: map.highNm,
  };
  return {
    task,
    filmKind: scene.filmKind,
    raw: sampleErrors(compared),
    indexDivided: sampleErrors({ ...compared, trueScale: opticalPathRatio(scene.drawn) }),
    barePixels: counts.bare,
    bareHeld: counts.bareHeld,
    otherPixels: counts.other,
    otherGivenThickness: counts.otherGiven,
    nearStepPixels: counts.nearStep,
    farOffPixels: counts.farOff,
    farOffNearStep: counts.farOffNearStep,
    drawn: scene.drawn,
    setup: scene.setup,
    fit: summary.fit,
    tally: tallyScene(scene, result),
    estimateMs,
    timingsMs: summary.timingsMs,
  };
}
