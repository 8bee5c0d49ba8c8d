import { sampleAt } from './sampled.ts';
import { SENSOR_COMPONENTS, sensorComponents } from './sensorFamily.ts';

/** Ways in which a real sensor's curve may leave the family, a channel. */
export const SENSOR_DEPARTURES = 6;

const START_NM = 380;
const STEP_NM = 5;
const COUNT = 81;
/** Distance over which a departure keeps its sign, nm: dyes and filters are smooth at this scale. */
const LENGTH_NM = 20;
/** Departure variance as a share of the family's own, before what the family can do is taken out. */
const VARIANCE_SHARE = 1;
const ROUNDS = 60;

let made: Float64Array | null = null;

/**
 * Smooth departures of a real sensor from the family: for each channel the leading eigenfunctions of a Gaussian process
 * whose standard deviation follows that of the family over wavelength, with what the family itself can do (and the unit
 * sum) taken out; each scaled to one standard deviation. 3 x SENSOR_DEPARTURES rows at the wavelengths given.
 *
 * The family's three components carry 93, 96 and 92 % of the variance of 50 measured cameras (Jiang et al. 2013 and the
 * collection behind `data/sensorFamily.ts`), so a camera of that kind departs with 4 to 8 % of it. Phones are not in the
 * collection and lie further out (`npm run validate -- --conditions measured`, `outside`): as much variance again as the
 * family's own is allowed for, of which six smooth functions keep the most.
 */
export function sensorDepartures(wavelengthNm: Float64Array): Float64Array {
  made ??= makeDepartures();
  const n = wavelengthNm.length;
  const out = new Float64Array(3 * SENSOR_DEPARTURES * n);
  for (let row = 0; row < 3 * SENSOR_DEPARTURES; row++) {
    const values = made.subarray(row * COUNT, (row + 1) * COUNT);
    out.set(sampleAt({ startNm: START_NM, stepNm: STEP_NM, values }, wavelengthNm), row * n);
  }
  return out;
}

function makeDepartures(): Float64Array {
  const grid = Float64Array.from({ length: COUNT }, (_, i) => START_NM + i * STEP_NM);
  const family = sensorComponents(grid);
  const out = new Float64Array(3 * SENSOR_DEPARTURES * COUNT);
  for (let c = 0; c < 3; c++) {
    const taken = orthonormal([
      new Float64Array(COUNT).fill(1),
      ...[1, 2, 3].map((k) =>
        family.slice((c * SENSOR_COMPONENTS + k) * COUNT, (c * SENSOR_COMPONENTS + k + 1) * COUNT),
      ),
    ]);
    const sd = new Float64Array(COUNT);
    for (let i = 0; i < COUNT; i++) {
      let square = 0;
      for (let k = 1; k < SENSOR_COMPONENTS; k++)
        square += family[(c * SENSOR_COMPONENTS + k) * COUNT + i]! ** 2;
      sd[i] = Math.sqrt(square);
    }
    out.set(leadingModes(sd, taken), c * SENSOR_DEPARTURES * COUNT);
  }
  return out;
}

/** Leading eigenfunctions, each times the root of its eigenvalue, by subspace iteration (Golub & Van Loan, 8.2.4). */
function leadingModes(sd: Float64Array, taken: readonly Float64Array[]): Float64Array {
  const near = Float64Array.from({ length: COUNT }, (_, i) =>
    Math.exp(-0.5 * ((i * STEP_NM) / LENGTH_NM) ** 2),
  );
  const times = (v: Float64Array): Float64Array => {
    const from = without(v, taken);
    const to = new Float64Array(COUNT);
    for (let i = 0; i < COUNT; i++) {
      let sum = 0;
      for (let j = 0; j < COUNT; j++) {
        sum += near[Math.abs(i - j)]! * sd[j]! * from[j]!;
      }
      to[i] = VARIANCE_SHARE * sd[i]! * sum;
    }
    return without(to, taken);
  };
  let modes: Float64Array[] = Array.from({ length: SENSOR_DEPARTURES }, (_, k) =>
    Float64Array.from(
      { length: COUNT },
      (_, i) => Math.cos((Math.PI * (k + 1) * (i + 0.5)) / COUNT) * sd[i]!,
    ),
  );
  for (let round = 0; round < ROUNDS; round++) modes = orthonormal(modes.map(times));
  const out = new Float64Array(SENSOR_DEPARTURES * COUNT);
  modes.forEach((mode, k) => {
    const moved = times(mode);
    let value = 0;
    for (let i = 0; i < COUNT; i++) value += mode[i]! * moved[i]!;
    for (let i = 0; i < COUNT; i++) out[k * COUNT + i] = Math.sqrt(Math.max(0, value)) * mode[i]!;
  });
  return out;
}

/** Gram-Schmidt, twice for safety's sake. */
function orthonormal(vectors: readonly Float64Array[]): Float64Array[] {
  const out: Float64Array[] = [];
  for (const vector of vectors) {
    const rest = without(without(vector, out), out);
    const size = Math.hypot(...rest);
    out.push(rest.map((v) => v / size));
  }
  return out;
}

/** A vector less its parts along orthonormal ones. */
function without(vector: Float64Array, taken: readonly Float64Array[]): Float64Array {
  const rest = vector.slice();
  for (const unit of taken) {
    let along = 0;
    for (let i = 0; i < rest.length; i++) along += unit[i]! * rest[i]!;
    for (let i = 0; i < rest.length; i++) rest[i]! -= along * unit[i]!;
  }
  return rest;
}
