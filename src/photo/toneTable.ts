import type { RgbEncoding } from '../colour/types.ts';

const tables = new WeakMap<RgbEncoding, Map<number, Float32Array>>();

/** Linear light 0..1 for each code 0..maxCode; made once for each encoding and depth. */
export function linearTable(encoding: RgbEncoding, maxCode: number): Float32Array {
  let byDepth = tables.get(encoding);
  if (!byDepth) {
    byDepth = new Map();
    tables.set(encoding, byDepth);
  }
  let table = byDepth.get(maxCode);
  if (!table) {
    table = Float32Array.from({ length: maxCode + 1 }, (_, code) =>
      Math.min(Math.max(encoding.decode(code / maxCode), 0), 1),
    );
    byDepth.set(maxCode, table);
  }
  return table;
}

/**
 * The way back: the code whose light is nearest in code value, found from the thresholds between codes, so that every
 * code of `linearTable` returns to itself exactly.
 */
export function nearestCode(encoding: RgbEncoding, maxCode: number): (linear: number) => number {
  const thresholds = Float64Array.from({ length: maxCode }, (_, code) =>
    encoding.decode((code + 0.5) / maxCode),
  );
  // A first guess by even bins of light leaves a step or two to walk.
  const bins = 4096;
  const firstCode = new Uint16Array(bins + 1);
  for (let bin = 0, code = 0; bin <= bins; bin++) {
    while (code < maxCode && thresholds[code]! < bin / bins) code++;
    firstCode[bin] = code;
  }
  return (linear) => {
    if (!(linear > 0)) return 0;
    if (linear >= 1) return maxCode;
    let code = firstCode[Math.floor(linear * bins)]!;
    while (code < maxCode && linear >= thresholds[code]!) code++;
    return code;
  };
}
