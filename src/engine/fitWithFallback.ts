import { type CameraFit, type FitInput, fitCamera } from '../match/fitCamera.ts';
import type { FitReport } from './contract.ts';

/** Samples of the first, annealed fit, which only has to find its way. */
const FIRST_SAMPLES = 1000;
/** Samples by which starts are compared. */
const SCOUT_SAMPLES = 500;
/** Film that spans less than this says too little of an unknown camera; of a known one it still tells exposure and veil. */
export const LEAST_SPAN_NM = 120;
export const LEAST_SPAN_KNOWN_NM = 30;

/** A fit, and how far the film's colours determined it. */
export interface Outcome {
  fit: CameraFit;
  readonly determined: FitReport['determined'];
  spanNm: readonly [number, number];
}

/** Fits from each start, keeps the likeliest; falls back to the references alone where the film says too little. */
export function fitWithFallback(
  base: Omit<FitInput, 'start'>,
  starts: readonly Float64Array[],
  fits: boolean,
  leastSpanNm: number,
): Outcome {
  const alone = () => fitCamera({ ...base, start: starts[0]!, samples: new Float64Array(0) });
  const count = base.samples.length / 3;
  if (!fits || count < 60) return { fit: alone(), determined: 'no', spanNm: [0, 0] };
  const few = base.samples.subarray(0, 3 * Math.min(count, FIRST_SAMPLES));
  const fit = bestOf({ ...base, samples: few }, starts);
  const spanNm = spanOf(fit.sampleNm);
  const width = spanNm[1] - spanNm[0];
  if (fit.filmShare < 0.3 || width < leastSpanNm) return { fit: alone(), determined: 'no', spanNm };
  return { fit, determined: width > 400 && fit.filmShare > 0.7 ? 'well' : 'partly', spanNm };
}

/** The fit from the start that leads furthest: several are first followed with fewer samples and rounds. */
function bestOf(base: Omit<FitInput, 'start'>, starts: readonly Float64Array[]): CameraFit {
  if (starts.length === 1) return fitCamera({ ...base, start: starts[0]! });
  const samples = base.samples.subarray(0, 3 * SCOUT_SAMPLES);
  let best: CameraFit | null = null;
  for (const start of starts) {
    const tried = fitCamera({ ...base, start, samples, scout: true });
    if (!best || tried.objective < best.objective) best = tried;
  }
  return fitCamera({ ...base, start: best!.parameters, near: true });
}

/** Thicknesses that the middle 96 % of the film samples span. */
export function spanOf(sampleNm: Float64Array): readonly [number, number] {
  const film = sampleNm.filter((d) => !Number.isNaN(d)).sort();
  if (film.length === 0) return [0, 0];
  return [film[Math.floor(0.02 * film.length)]!, film[Math.floor(0.98 * (film.length - 1))]!];
}
