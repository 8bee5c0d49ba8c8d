import type { CameraFit } from '../match/fitCamera.ts';
import { PARAMETER_NAMES, PARAMETERS, type Prior } from '../match/parameters.ts';
import { inverseOf } from '../match/symmetric.ts';
import type { FitReport } from './contract.ts';
import type { Setup } from './setup.ts';

/** Turns a fit into what a person and a script read. */
export function describeFit(
  fit: CameraFit,
  determined: FitReport['determined'],
  prior: Prior,
  spanNm: readonly [number, number],
  setup: Setup,
  keptName: string | null = null,
): FitReport {
  // Standard deviations of the prior each by itself: a kept camera's parameters go together.
  const before = inverseOf(prior.precision, PARAMETERS);
  return {
    determined,
    spanNm: [Math.round(spanNm[0]), Math.round(spanNm[1])],
    residualCodes: fit.residualCodes,
    parameters: PARAMETER_NAMES.map((name, p) => ({
      name,
      value: fit.parameters[p]!,
      sd: Math.sqrt(fit.covariance[p * PARAMETERS + p]!),
      priorSd: Math.sqrt(before[p * PARAMETERS + p]!),
    })),
    advice:
      keptName === null ? adviceFor(determined, spanNm, setup) : adviceWithKept(determined, spanNm, keptName),
  };
}

/** What is said of a fit that began from a kept camera. */
function adviceWithKept(
  determined: FitReport['determined'],
  spanNm: readonly [number, number],
  name: string,
): string {
  if (determined === 'no')
    return `The film shows too few colours to check the kept camera “${name}”: it is taken as it is.`;
  return `This photo’s film spans ${spanWords(spanNm)}, read with the kept camera “${name}”; the photo agrees with it.`;
}

const spanWords = ([from, to]: readonly [number, number]) =>
  `${Math.round(from / 10) * 10} to ${Math.round(to / 10) * 10} nm`;

function adviceFor(
  determined: FitReport['determined'],
  spanNm: readonly [number, number],
  setup: Setup,
): string {
  const span = spanWords(spanNm);
  if (determined === 'well') return `This photo’s film spans ${span}: the camera could be fitted well.`;
  const missing =
    setup.references?.clean || setup.references?.white
      ? 'A photo with more colours of the film would narrow the intervals.'
      : 'Mark bare surface beside the film, or a grey card.';
  if (determined === 'partly')
    return `This photo’s film spans ${span}: the camera could be fitted in part. ${missing}`;
  return `The film’s colours cover too little of the chart to fit the camera, so a typical phone camera is assumed. ${missing}`;
}
