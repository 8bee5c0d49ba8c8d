import type { CameraFit } from '../match/fitCamera.ts';
import { PARAMETER_NAMES, PARAMETERS, type Prior } from '../match/parameters.ts';
import type { FitReport } from './contract.ts';
import type { Setup } from './setup.ts';

/** Turns a fit into what a person and a script read. */
export function describeFit(
  fit: CameraFit,
  determined: FitReport['determined'],
  prior: Prior,
  spanNm: readonly [number, number],
  setup: Setup,
): FitReport {
  return {
    determined,
    spanNm: [Math.round(spanNm[0]), Math.round(spanNm[1])],
    residualCodes: fit.residualCodes,
    parameters: PARAMETER_NAMES.map((name, p) => ({
      name,
      value: fit.parameters[p]!,
      sd: Math.sqrt(fit.covariance[p * PARAMETERS + p]!),
      priorSd: 1 / Math.sqrt(prior.precision[p * PARAMETERS + p]!),
    })),
    advice: adviceFor(determined, spanNm, setup),
  };
}

function adviceFor(
  determined: FitReport['determined'],
  spanNm: readonly [number, number],
  setup: Setup,
): string {
  const span = `${Math.round(spanNm[0] / 10) * 10} to ${Math.round(spanNm[1] / 10) * 10} nm`;
  if (determined === 'well') return `This photo’s film spans ${span}: the camera could be fitted well.`;
  const missing =
    setup.references?.clean || setup.references?.white
      ? 'A photo with more colours of the film would narrow the intervals.'
      : 'Mark bare surface beside the film, or a grey card.';
  if (determined === 'partly')
    return `This photo’s film spans ${span}: the camera could be fitted in part. ${missing}`;
  return `The film’s colours cover too little of the chart to fit the camera, so a typical phone camera is assumed. ${missing}`;
}
