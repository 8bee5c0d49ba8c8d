import type { ChannelWeights } from './types.ts';

/**
 * Channel values of many reflectance spectra: out[3 j + c] = sum over i of weights[c][i] table[j][i].
 * @param table spectra row by row, rows x wavelengths
 */
export function applyWeights(weights: ChannelWeights, table: Float64Array, out?: Float64Array): Float64Array {
  return applyRows(weights.weights, 3, weights.wavelengthNm.length, table, out);
}

/**
 * The same for any number of weight rows: out[rows * j + c].
 * @throws RangeError when the table does not hold whole spectra of `count` samples
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
  for (let j = 0; j < spectra; j++) {
    const at = j * count;
    for (let c = 0; c < rows; c++) {
      const row = c * count;
      let sum = 0;
      for (let i = 0; i < count; i++) sum += weights[row + i]! * table[at + i]!;
      values[rows * j + c] = sum;
    }
  }
  return values;
}
