import type { CameraModel } from '../match/cameraModel.ts';
import type { FitInput } from '../match/fitCamera.ts';
import type { Prior } from '../match/parameters.ts';
import { type FilmSample, SAMPLE_VARIANCE_SHARE } from '../match/sampleFilm.ts';
import type { References } from './references.ts';

/** Share of its weight that a sample keeps, because samples share errors of compression and processing. */
const SAMPLE_WEIGHT = 0.05;
/** What a sampled colour may be off for reasons other than noise, codes of 255. */
const SAMPLE_ERROR = 2;

/** What a camera is fitted to: the film samples at their weight, and the marked references. */
export function fitInput(
  model: CameraModel,
  prior: Prior,
  sample: FilmSample,
  references: References,
): Omit<FitInput, 'start'> {
  return {
    model,
    prior,
    samples: sample.codes,
    sampleWeight: SAMPLE_WEIGHT,
    references: references.evidence,
    sampleSd: sampleSd(sample),
  };
}

function sampleSd(sample: FilmSample): number {
  const noise = Math.hypot(...sample.pixelNoise) / Math.sqrt(3);
  return Math.hypot(noise * Math.sqrt(SAMPLE_VARIANCE_SHARE), SAMPLE_ERROR);
}
