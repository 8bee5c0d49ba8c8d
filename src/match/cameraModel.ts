import { SENSOR_DEPARTURES } from '../colour/sensorDepartures.ts';
import { SENSOR_COMPONENTS } from '../colour/sensorFamily.ts';
import type { RgbEncoding } from '../colour/types.ts';
import { COMPONENTS, type FilmBasis, ROW } from './filmBasis.ts';
import { AT, MATRIX_ENTRIES, PARAMETERS } from './parameters.ts';
import { toneFourth, toneOf, toneS, toneSkew, toneSlope } from './toneCurve.ts';

/** Everything of the forward model that stays fixed while its parameters move. */
export interface CameraModel {
  readonly basis: FilmBasis;
  readonly encoding: RgbEncoding;
  /** Colour matrix (row-major 3 x 3) for sensor coefficients; white-preserving. */
  readonly matrixFor: (coefficients: Float64Array) => Float64Array;
}

/** The model at one parameter vector: code values (0..255) and, where asked, their derivatives. */
export interface ModelEvaluator {
  /** Moves to a parameter vector; recomputes the matrix and its derivatives by the sensor. */
  readonly moveTo: (parameters: Float64Array, withDerivatives: boolean) => void;
  /** Codes of chart row `j` into out[at .. at+2]. */
  readonly codesAt: (j: number, out: Float64Array, at: number) => void;
  /** d code_c / d parameter for row `j` into out[c * PARAMETERS + p]. */
  readonly jacobianAt: (j: number, out: Float64Array) => void;
  /** Codes of a plain linear level (no film), the same in all channels: a card of reflectance `level`, or 0 for black. */
  readonly codesOfLevel: (level: number, out: Float64Array, at: number) => void;
  readonly jacobianOfLevel: (level: number, out: Float64Array) => void;
}

const FULL = 255;
/** Step for derivatives of the matrix by sensor coefficients, in standard deviations of the family. */
const SENSOR_STEP = 0.05;

/** Place of the coefficient of channel c's component k (1 and up) in the parameter vector. */
function placeOf(c: number, k: number): number {
  return k < SENSOR_COMPONENTS
    ? AT.sensor + c * (SENSOR_COMPONENTS - 1) + k - 1
    : AT.departure + c * SENSOR_DEPARTURES + k - SENSOR_COMPONENTS;
}

/** Slope of the encoding by a central difference small against its curvature everywhere. */
function encodeSlope(encoding: RgbEncoding, linear: number): number {
  const h = 1e-5;
  return (encoding.encode(linear + h) - encoding.encode(linear - h)) / (2 * h);
}

/**
 * Forward model code_c = 255 t(enc(gain_c sum_c' M_cc' s_c' + veil_c)), with s the white-normalised sensor responses.
 * No allocation after construction.
 */
export function modelEvaluator(model: CameraModel): ModelEvaluator {
  const { basis, encoding } = model;
  const parameters = new Float64Array(PARAMETERS);
  const matrix = new Float64Array(9);
  const matrixBySensor = new Float64Array(9 * 9);
  const coefficients = new Float64Array(9);
  const gain = new Float64Array(3);
  const white = new Float64Array(ROW);
  const whiteSum = new Float64Array(3);
  const response = new Float64Array(3);
  const rgb = new Float64Array(3);
  const linear = new Float64Array(3);

  const weightOf = (c: number, k: number) => (k === 0 ? 1 : parameters[placeOf(c, k)]!);

  function moveTo(next: Float64Array, withDerivatives: boolean): void {
    parameters.set(next);
    coefficients.set(next.subarray(AT.sensor, AT.sensor + 9));
    const nominal = model.matrixFor(coefficients);
    if (withDerivatives) {
      for (let k = 0; k < 9; k++) {
        const keep = coefficients[k]!;
        coefficients[k] = keep + SENSOR_STEP;
        const moved = model.matrixFor(coefficients);
        coefficients[k] = keep;
        for (let i = 0; i < 9; i++) matrixBySensor[k * 9 + i] = (moved[i]! - nominal[i]!) / SENSOR_STEP;
      }
    }
    matrix.set(nominal);
    for (let e = 0; e < 6; e++) {
      const [row, column] = MATRIX_ENTRIES[e]!;
      matrix[row * 3 + column]! += parameters[AT.matrix + e]!;
      matrix[row * 3 + row]! -= parameters[AT.matrix + e]!;
    }
    const mired = parameters[AT.mired]!;
    for (let c = 0; c < 3; c++) {
      gain[c] = Math.exp(parameters[AT.logGain + c]!);
      let sum = 0;
      for (let k = 0; k < COMPONENTS; k++) {
        const w = basis.white[c * COMPONENTS + k]! + mired * basis.whitePerMired[c * COMPONENTS + k]!;
        white[c * COMPONENTS + k] = w;
        sum += weightOf(c, k) * w;
      }
      whiteSum[c] = sum;
    }
  }

  /** Basis entry of row j at the present index and light. */
  function entry(at: number): number {
    return (
      basis.table[at]! +
      parameters[AT.index]! * basis.perIndex[at]! +
      parameters[AT.mired]! * basis.perMired[at]!
    );
  }

  function respond(j: number): void {
    for (let c = 0; c < 3; c++) {
      const at = j * ROW + c * COMPONENTS;
      let sum = entry(at);
      for (let k = 1; k < COMPONENTS; k++) sum += weightOf(c, k) * entry(at + k);
      response[c] = sum / whiteSum[c]!;
    }
    for (let c = 0; c < 3; c++) {
      rgb[c] =
        matrix[c * 3]! * response[0]! + matrix[c * 3 + 1]! * response[1]! + matrix[c * 3 + 2]! * response[2]!;
      linear[c] = gain[c]! * rgb[c]! + parameters[AT.veil + c]!;
    }
  }

  function codesFromLinear(out: Float64Array, at: number): void {
    for (let c = 0; c < 3; c++) {
      out[at + c] = FULL * toneOf(encoding.encode(Math.min(1, Math.max(0, linear[c]!))), parameters, AT.tone);
    }
  }

  /** Fills rows from d(gain M s)/dp in `inner` form; shared by film rows and plain levels. */
  function finishRow(c: number, out: Float64Array): void {
    const row = c * PARAMETERS;
    const level = Math.min(1, Math.max(0, linear[c]!));
    const e = encoding.encode(level);
    const slope =
      FULL *
      toneSlope(e, parameters, AT.tone) *
      (linear[c]! > 0 && linear[c]! < 1 ? encodeSlope(encoding, level) : 0);
    out[row + AT.logGain + c] = gain[c]! * rgb[c]!;
    out[row + AT.veil + c] = 1;
    for (let p = 0; p < PARAMETERS; p++) out[row + p]! *= slope;
    out[row + AT.tone] = FULL * toneS(e);
    out[row + AT.tone + 1] = FULL * toneSkew(e);
    out[row + AT.tone + 2] = FULL * toneFourth(e);
  }

  function jacobianAt(j: number, out: Float64Array): void {
    respond(j);
    out.fill(0, 0, 3 * PARAMETERS);
    const mired = parameters[AT.mired]!;
    for (let source = 0; source < 3; source++) {
      const at = j * ROW + source * COMPONENTS;
      const s = response[source]!;
      let byIndex = 0;
      let byMired = 0;
      for (let k = 0; k < COMPONENTS; k++) {
        const w = weightOf(source, k);
        byIndex += w * basis.perIndex[at + k]!;
        byMired += w * (basis.perMired[at + k]! - s * basis.whitePerMired[source * COMPONENTS + k]!);
      }
      for (let c = 0; c < 3; c++) {
        const row = c * PARAMETERS;
        const through = (gain[c]! * matrix[c * 3 + source]!) / whiteSum[source]!;
        out[row + AT.index]! += through * byIndex;
        out[row + AT.mired]! += through * byMired;
        for (let k = 1; k < COMPONENTS; k++) {
          const own =
            basis.table[at + k]! +
            parameters[AT.index]! * basis.perIndex[at + k]! +
            mired * basis.perMired[at + k]!;
          let d = through * (own - s * white[source * COMPONENTS + k]!);
          if (k < SENSOR_COMPONENTS) {
            const by = (source * 3 + k - 1) * 9 + c * 3;
            d +=
              gain[c]! *
              (matrixBySensor[by]! * response[0]! +
                matrixBySensor[by + 1]! * response[1]! +
                matrixBySensor[by + 2]! * response[2]!);
          }
          out[row + placeOf(source, k)] = d;
        }
      }
    }
    for (let e = 0; e < 6; e++) {
      const [c, source] = MATRIX_ENTRIES[e]!;
      out[c * PARAMETERS + AT.matrix + e] = gain[c]! * (response[source]! - response[c]!);
    }
    for (let c = 0; c < 3; c++) finishRow(c, out);
  }

  function setLevel(level: number): void {
    for (let c = 0; c < 3; c++) {
      rgb[c] = level;
      linear[c] = gain[c]! * level + parameters[AT.veil + c]!;
    }
  }

  return {
    moveTo,
    codesAt: (j, out, at) => {
      respond(j);
      codesFromLinear(out, at);
    },
    jacobianAt,
    codesOfLevel: (level, out, at) => {
      setLevel(level);
      codesFromLinear(out, at);
    },
    jacobianOfLevel: (level, out) => {
      setLevel(level);
      out.fill(0, 0, 3 * PARAMETERS);
      for (let c = 0; c < 3; c++) finishRow(c, out);
    },
  };
}
