import { leastSquares } from './leastSquares.ts';

/** Thickness readings of a draining film, one entry a reading. `heightM` is the depth below the top of the film. */
export interface DrainageReadings {
  readonly timeS?: Float64Array;
  readonly heightM?: Float64Array;
  readonly thicknessNm: Float64Array;
  /** One standard deviation each; a 90 % interval's width over 3.29. */
  readonly sdNm: Float64Array;
}

export type DrainageLawId = 'exponential' | 'reynolds' | 'rigidVertical' | 'powerLaw';

export interface DrainageLaw {
  readonly id: DrainageLawId;
  readonly name: string;
  readonly formula: string;
  readonly source: string;
  readonly needs: readonly ('timeS' | 'heightM')[];
  /** Positive ones are fitted as logarithms, so that no fit strays past zero. */
  readonly parameters: readonly {
    readonly name: string;
    readonly unit: string;
    readonly positive: boolean;
  }[];
  readonly thicknessNm: (parameters: Float64Array, timeS: number, heightM: number) => number;
  /** A first guess from the readings. */
  readonly start: (readings: DrainageReadings) => number[];
}

export const DRAINAGE_LAWS: Readonly<Record<DrainageLawId, DrainageLaw>> = {
  exponential: {
    id: 'exponential',
    name: 'Exponential thinning',
    formula: 'h = h0 exp(-t / tau)',
    source: 'empirical; usual for films with mobile surfaces, common practice',
    needs: ['timeS'],
    parameters: [
      { name: 'h0', unit: 'nm', positive: true },
      { name: 'tau', unit: 's', positive: true },
    ],
    thicknessNm: (p, timeS) => p[0]! * Math.exp(-timeS / p[1]!),
    start: (readings) => {
      const { thicknessNm, timeS } = readings;
      const { slope, intercept } = line(
        timeS!,
        thicknessNm.map(Math.log),
        weights(readings, (h) => 1 / h),
      );
      return [Math.exp(intercept), slope < 0 ? -1 / slope : 10 * span(readings.timeS!)];
    },
  },
  reynolds: {
    id: 'reynolds',
    name: 'Reynolds, plane film between rigid surfaces',
    formula: '1 / h² = 1 / h0² + t / k, late h = (k / t)^(1/2); k = 3 eta R² / (4 dp)',
    source:
      'Reynolds 1886, Phil. Trans. R. Soc. 177:157, for a disc of radius R under a pressure difference dp; from memory',
    needs: ['timeS'],
    parameters: [
      { name: 'h0', unit: 'nm', positive: true },
      { name: 'k', unit: 'nm² s', positive: true },
    ],
    thicknessNm: (p, timeS) => 1 / Math.sqrt(1 / (p[0]! * p[0]!) + timeS / p[1]!),
    start: (readings) => {
      const { slope, intercept } = line(
        readings.timeS!,
        readings.thicknessNm.map((h) => 1 / (h * h)),
        weights(readings, (h) => 2 / (h * h * h)),
      );
      const thickest = readings.thicknessNm.reduce((most, h) => Math.max(most, h));
      return [
        intercept > 0 ? 1 / Math.sqrt(intercept) : 2 * thickest,
        slope > 0 ? 1 / slope : 10 * span(readings.timeS!) * thickest * thickest,
      ];
    },
  },
  rigidVertical: {
    id: 'rigidVertical',
    name: 'Vertical film with rigid surfaces',
    formula: 'h = a (z / t)^(1/2); a = 2 (nu / g)^(1/2)',
    source:
      'Mysels, Shinoda & Frankel 1959, Soap Films; from memory, and follows from h³ rho g / (12 eta) down the film',
    needs: ['timeS', 'heightM'],
    parameters: [{ name: 'a', unit: 'nm (s/m)^(1/2)', positive: true }],
    thicknessNm: (p, timeS, heightM) => p[0]! * Math.sqrt(heightM / timeS),
    start: (readings) => {
      const first = readings.thicknessNm.findIndex(
        (_, i) => readings.heightM![i]! > 0 && readings.timeS![i]! > 0,
      );
      const at = Math.max(0, first);
      return [readings.thicknessNm[at]! * Math.sqrt(readings.timeS![at]! / readings.heightM![at]!)];
    },
  },
  powerLaw: {
    id: 'powerLaw',
    name: 'Power of time',
    formula: 'h = a (t / 1 s)^b',
    source: 'empirical: its exponent tells the laws apart (rigid surfaces -1/2)',
    needs: ['timeS'],
    parameters: [
      { name: 'a', unit: 'nm', positive: true },
      { name: 'b', unit: '', positive: false },
    ],
    thicknessNm: (p, timeS) => p[0]! * timeS ** p[1]!,
    start: (readings) => {
      const { slope, intercept } = line(
        readings.timeS!.map(Math.log),
        readings.thicknessNm.map(Math.log),
        weights(readings, (h) => 1 / h),
      );
      return [Math.exp(intercept), slope];
    },
  },
};

export interface DrainageFit {
  readonly law: DrainageLawId;
  readonly parameters: readonly {
    readonly name: string;
    readonly unit: string;
    readonly value: number;
    /**
     * From the readings' intervals, widened by the Birge ratio where the readings scatter by more than they say; NaN
     * where the readings do not determine the parameters.
     */
    readonly sd: number;
  }[];
  readonly residualsNm: Float64Array;
  readonly rootMeanSquareNm: number;
  /** Root of chi square over degrees of freedom: near 1 where law and intervals fit the readings. */
  readonly birgeRatio: number;
  readonly degreesOfFreedom: number;
  readonly converged: boolean;
}

/**
 * Fits a published drainage law to thickness readings by weighted least squares.
 * @throws RangeError where readings are missing, too few, or (for laws with a time origin) not at positive times
 */
export function fitDrainageLaw(id: DrainageLawId, readings: DrainageReadings): DrainageFit {
  const law = DRAINAGE_LAWS[id];
  mustSuit(law, readings);
  const { thicknessNm, sdNm, timeS, heightM } = readings;
  const size = law.parameters.length;
  const plain = (fitted: Float64Array) =>
    fitted.map((v, k) => (law.parameters[k]!.positive ? Math.exp(v) : v));
  const fit = leastSquares(
    (fitted, i) => law.thicknessNm(plain(fitted), timeS?.[i] ?? 0, heightM?.[i] ?? 0),
    thicknessNm,
    sdNm,
    Float64Array.from(law.start(readings), (v, k) => (law.parameters[k]!.positive ? Math.log(v) : v)),
  );
  const values = plain(fit.parameters);
  const birgeRatio = Math.sqrt(fit.chiSquare / fit.degreesOfFreedom);
  return {
    law: id,
    parameters: law.parameters.map(({ name, unit, positive }, k) => ({
      name,
      unit,
      value: values[k]!,
      sd: Math.sqrt(fit.covariance[k * size + k]!) * (positive ? values[k]! : 1) * Math.max(1, birgeRatio),
    })),
    residualsNm: fit.residuals,
    rootMeanSquareNm: Math.sqrt(fit.residuals.reduce((sum, r) => sum + r * r, 0) / fit.residuals.length),
    birgeRatio,
    degreesOfFreedom: fit.degreesOfFreedom,
    converged: fit.converged,
  };
}

function mustSuit(law: DrainageLaw, readings: DrainageReadings): void {
  const count = readings.thicknessNm.length;
  if (readings.sdNm.length !== count || law.needs.some((need) => readings[need]?.length !== count)) {
    throw new RangeError(
      `The law "${law.name}" needs ${law.needs.map((need) => (need === 'timeS' ? 'a time' : 'a height')).join(' and ')} and an interval for every thickness.`,
    );
  }
  if (readings.sdNm.some((sd) => !(sd > 0))) {
    throw new RangeError('Every reading needs an interval wider than nothing.');
  }
  if (readings.thicknessNm.some((h) => !(h > 0))) {
    throw new RangeError(
      'Every thickness must be more than 0 nm: leave black film and places without an answer out.',
    );
  }
  const fromZero = law.id === 'powerLaw' || law.id === 'rigidVertical';
  if (fromZero && readings.timeS!.some((t) => !(t > 0))) {
    throw new RangeError(
      'This law counts time from the making of the film: every time must be more than 0 s.',
    );
  }
  if (law.id === 'rigidVertical' && readings.heightM!.some((z) => !(z > 0))) {
    throw new RangeError(
      'This law counts height down from the top of the film: every height must be more than 0 m.',
    );
  }
}

/** Weights for a straight line through a function of thickness, whose derivative carries the readings' intervals over. */
function weights(
  { thicknessNm, sdNm }: DrainageReadings,
  derivative: (thicknessNm: number) => number,
): Float64Array {
  return thicknessNm.map((h, i) => 1 / (derivative(h) * sdNm[i]!) ** 2);
}

/** Weighted straight line through points. */
function line(
  x: Float64Array,
  y: Float64Array,
  weight: Float64Array,
): { readonly slope: number; readonly intercept: number } {
  const total = weight.reduce((sum, w) => sum + w, 0);
  const meanX = x.reduce((sum, v, i) => sum + weight[i]! * v, 0) / total;
  const meanY = y.reduce((sum, v, i) => sum + weight[i]! * v, 0) / total;
  let across = 0;
  let along = 0;
  for (let i = 0; i < x.length; i++) {
    across += weight[i]! * (x[i]! - meanX) * (y[i]! - meanY);
    along += weight[i]! * (x[i]! - meanX) ** 2;
  }
  const slope = along > 0 ? across / along : 0;
  return { slope, intercept: meanY - slope * meanX };
}

function span(x: Float64Array): number {
  return x.reduce((a, b) => Math.max(a, b)) - x.reduce((a, b) => Math.min(a, b));
}
