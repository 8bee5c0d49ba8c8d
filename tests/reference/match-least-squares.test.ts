import { levenbergMarquardt } from 'ml-levenberg-marquardt';
import { describe, expect, it } from 'vitest';
import { modelEvaluator } from '../../src/match/cameraModel.ts';
import { fitCamera, type ReferenceEvidence } from '../../src/match/fitCamera.ts';
import { AT, PARAMETERS, type Prior } from '../../src/match/parameters.ts';
import { seededRandom } from '../../src/scene/random.ts';
import { plausibleParameters, soapModel } from '../match/soapModel.ts';

/** Free parameters of the small case and their prior standard deviations; all others are held. */
const FREE = [AT.logGain, AT.logGain + 1, AT.logGain + 2, AT.veil, AT.veil + 1, AT.veil + 2, AT.tone];
const FREE_SD = [0.1, 0.1, 0.1, 0.01, 0.01, 0.01, 0.1];
const HELD_SD = 1e-6;
const SD_CODES = 0.3;
/** Prior spread of a sample about its label that the fit states (`fitEquations.ts`), nm. */
const SLIDE_NM = 60;

function priorAbout(mean: Float64Array): Prior {
  const precision = new Float64Array(PARAMETERS * PARAMETERS);
  for (let p = 0; p < PARAMETERS; p++) precision[p * PARAMETERS + p] = 1 / HELD_SD ** 2;
  FREE.forEach((p, k) => {
    precision[p * PARAMETERS + p] = 1 / FREE_SD[k]! ** 2;
  });
  return { mean, precision };
}

/** The library's least squares for residuals (model - seen) / sd, one of them a datum. */
function library(model: (p: number[]) => number[], seen: number[], start: number[]): number[] {
  let last: { key: string; values: number[] } = { key: '', values: [] };
  const { parameterValues } = levenbergMarquardt(
    { x: seen.map((_, i) => i), y: seen },
    (p) => {
      const key = p.join();
      if (key !== last.key) last = { key, values: model(p) };
      const { values } = last;
      return (i: number) => values[i]!;
    },
    {
      initialValues: start,
      damping: 1e-3,
      maxIterations: 200,
      errorTolerance: 1e-14,
      centralDifference: true,
      gradientDifference: 1e-5,
    },
  );
  return parameterValues;
}

describe('camera fit against a general-purpose library (npm ml-levenberg-marquardt)', () => {
  const model = soapModel(2, 800);
  const step = model.basis.stepNm;
  const evaluator = modelEvaluator(model);
  const truth = plausibleParameters();
  const mean = truth.slice();
  FREE.forEach((p, k) => {
    mean[p]! += FREE_SD[k]! * [0.8, -0.6, 0.5, 0.7, -0.4, 0.3, -0.9][k]!;
  });
  const prior = priorAbout(mean);
  const random = seededRandom('library');
  const codesOf = (parameters: Float64Array, j: number): number[] => {
    const out = new Float64Array(3);
    evaluator.moveTo(parameters, false);
    evaluator.codesAt(j, out, 0);
    return [...out];
  };
  const at = (free: number[]): Float64Array => {
    const parameters = mean.slice();
    FREE.forEach((p, k) => {
      parameters[p] = free[k]!;
    });
    return parameters;
  };

  it('finds the same gains, veils and tone curve from marked references', () => {
    evaluator.moveTo(truth, false);
    const out = new Float64Array(3);
    const seen = (fill: () => void): [number, number, number] => {
      fill();
      return [out[0]! + random.normal(), out[1]! + random.normal(), out[2]! + random.normal()];
    };
    const levels = [0.05, 0.12];
    const references: ReferenceEvidence[] = [
      { kind: 'clean', codes: seen(() => evaluator.codesAt(0, out, 0)), sd: 1, reflectance: null },
      ...levels.map((level) => ({
        kind: 'card' as const,
        codes: seen(() => evaluator.codesOfLevel(level, out, 0)),
        sd: 1,
        reflectance: level,
      })),
      { kind: 'dark', codes: seen(() => evaluator.codesOfLevel(0, out, 0)), sd: 1, reflectance: null },
    ];
    const ours = fitCamera({
      model,
      prior,
      start: mean,
      samples: new Float64Array(0),
      sampleSd: 1,
      sampleWeight: 1,
      references,
    });
    const theirs = library(
      (free) => {
        const values: number[] = [];
        evaluator.moveTo(at(free), false);
        const codes = new Float64Array(3);
        evaluator.codesAt(0, codes, 0);
        values.push(...codes);
        for (const level of [...levels, 0]) {
          evaluator.codesOfLevel(level, codes, 0);
          values.push(...codes);
        }
        return [...values, ...free.map((v, k) => v / FREE_SD[k]!)];
      },
      [...references.flatMap((r) => [...r.codes]), ...FREE.map((p, k) => mean[p]! / FREE_SD[k]!)],
      FREE.map((p) => mean[p]!),
    );
    FREE.forEach((p, k) => {
      const sd = Math.sqrt(ours.covariance[p * PARAMETERS + p]!);
      expect(Math.abs(ours.parameters[p]! - theirs[k]!) / sd, `parameter ${p}`).toBeLessThan(0.01);
    });
  });

  it('finds the same camera from film colours that may slide along the chart (orthogonal-distance fit)', () => {
    const labels = Array.from({ length: 14 }, (_, k) => 20 + 26 * k);
    const samples = Float64Array.from(
      labels.flatMap((j) => codesOf(truth, j).map((v) => v + SD_CODES * random.normal())),
    );
    const ours = fitCamera({
      model,
      prior,
      start: truth,
      near: true,
      samples,
      sampleSd: SD_CODES,
      sampleWeight: 1,
      references: [],
      allowed: Uint32Array.from(labels.flatMap((j) => [j, j + 1])),
    });
    const theirs = library(
      (p) => {
        const free = p.slice(0, FREE.length);
        const parameters = at(free);
        const values = labels.flatMap((j, i) => {
          const before = codesOf(parameters, j - 1);
          const after = codesOf(parameters, j + 1);
          const slideNm = p[FREE.length + i]!;
          return codesOf(parameters, j).map(
            (v, c) => (v + (slideNm * (after[c]! - before[c]!)) / (2 * step)) / SD_CODES,
          );
        });
        return [
          ...values,
          ...free.map((v, k) => v / FREE_SD[k]!),
          ...p.slice(FREE.length).map((s) => s / SLIDE_NM),
        ];
      },
      [
        ...Array.from(samples, (v) => v / SD_CODES),
        ...FREE.map((p, k) => mean[p]! / FREE_SD[k]!),
        ...labels.map(() => 0),
      ],
      [...FREE.map((p) => truth[p]!), ...labels.map(() => 0)],
    );
    FREE.forEach((p, k) => {
      const sd = Math.sqrt(ours.covariance[p * PARAMETERS + p]!);
      expect(sd, `parameter ${p} is told by the film`).toBeLessThan(FREE_SD[k]!);
      // Ours leaves out how a slide changes with the camera: second order in 0.3 codes.
      expect(Math.abs(ours.parameters[p]! - theirs[k]!) / sd, `parameter ${p}`).toBeLessThan(0.02);
    });
  });
});
