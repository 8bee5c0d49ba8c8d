import type { ChannelWeights } from './types.ts';

/**
 * Channel values of many reflectance spectra: out[3 j + c] = sum over i of weights[c][i] table[j][i].
 * @param table spectra row by row, spectra x wavelengths
 * @param out reused when given; must hold 3 x spectra
 * @throws RangeError when the table does not hold whole spectra, or `out` is too short
 */
export function applyWeights(weights: ChannelWeights, table: Float64Array, out?: Float64Array): Float64Array {
  return applyRows(weights.weights, 3, weights.wavelengthNm.length, table, out);
}

/**
 * The same for any number of weight rows: out[rows * j + r].
 *
 * Three rows share one walk over a spectrum: a single running sum would wait for its own last addition.
 * @throws RangeError when the table does not hold whole spectra of `count` samples, or `out` is too short
 */
export function applyRows(
  weights: Float64Array,
  rows: number,
  count: number,
  table: Float64Array,
  out?: Float64Array,
): Float64Array {
  const spectra = table.length / count;
  if (!Number.isInteger(spectra))
    throw new RangeError(`A table of ${table.length} does not hold spectra of ${count} samples.`);
  const values = out ?? new Float64Array(rows * spectra);
  if (values.length < rows * spectra)
    throw new RangeError(`Results of ${rows * spectra} values do not fit into ${values.length}.`);
  const together = rows - (rows % 3);
  for (let j = 0; j < spectra; j++) {
    const at = j * count;
    for (let r = 0; r < together; r += 3) {
      const p = r * count;
      const q = p + count;
      const s = q + count;
      let first = 0;
      let second = 0;
      let third = 0;
      for (let i = 0; i < count; i++) {
        const reflectance = table[at + i]!;
        first += weights[p + i]! * reflectance;
        second += weights[q + i]! * reflectance;
        third += weights[s + i]! * reflectance;
      }
      values[rows * j + r] = first;
      values[rows * j + r + 1] = second;
      values[rows * j + r + 2] = third;
    }
    for (let r = together; r < rows; r++) {
      let sum = 0;
      for (let i = 0; i < count; i++) sum += weights[r * count + i]! * table[at + i]!;
      values[rows * j + r] = sum;
    }
  }
  return values;
}
