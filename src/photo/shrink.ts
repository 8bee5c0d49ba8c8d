import type { RgbEncoding } from '../colour/types.ts';
import { clippedFrom } from './exposure.ts';
import { linearTable, nearestCode } from './toneTable.ts';

/** Largest whole size of at most `maxPixels` with (nearly) the sides' ratio; the size itself where it fits. */
export function fittingSize(
  width: number,
  height: number,
  maxPixels: number,
): { readonly width: number; readonly height: number } {
  if (width * height <= maxPixels) return { width, height };
  const scale = Math.sqrt(maxPixels / (width * height));
  return {
    width: Math.max(1, Math.floor(width * scale)),
    height: Math.max(1, Math.floor(height * scale)),
  };
}

export interface Shrinker {
  /** `rows` more source rows, interleaved. */
  push(source: ArrayLike<number>, rows: number): void;
}

/**
 * Shrinks a photo as its rows arrive: each new pixel is the mean of the LIGHT on its area (the codes are decoded first:
 * a mean of codes would darken every edge), brought back to the nearest code. A channel that is clipped anywhere in the
 * area stays clipped, since its mean is not known. A fourth channel comes out full.
 * @param emit receives each finished row; the array is used again for the next
 */
export function areaShrinker(
  size: { readonly width: number; readonly height: number },
  target: { readonly width: number; readonly height: number },
  channels: 3 | 4,
  maxCode: 255 | 65535,
  encoding: RgbEncoding,
  emit: (row: number, codes: Uint16Array) => void,
): Shrinker {
  const light = linearTable(encoding, maxCode).slice();
  // A sum with infinity in it stays infinite, and comes out as the largest code.
  light.fill(Number.POSITIVE_INFINITY, Math.ceil(clippedFrom(maxCode)));
  const toCode = nearestCode(encoding, maxCode);
  const { firstTarget, firstShare } = spread(size.width, target.width);
  const rowStep = target.height / size.height;
  const area = (size.width / target.width) * (size.height / target.height);
  let sums = new Float64Array(target.width * 3);
  let next = new Float64Array(target.width * 3);
  const line = new Float64Array(target.width * 3);
  const out = new Uint16Array(target.width * channels).fill(maxCode);
  let y = 0;
  let row = 0;

  const finish = () => {
    for (let x = 0; x < target.width; x++)
      for (let c = 0; c < 3; c++) out[x * channels + c] = toCode(sums[x * 3 + c]! / area);
    emit(row++, out);
    [sums, next] = [next, sums];
    next.fill(0);
  };
  const addLine = (source: ArrayLike<number>, from: number) => {
    line.fill(0);
    let at = from;
    for (let x = 0; x < size.width; x++, at += channels) {
      const share = firstShare[x]!;
      const to = firstTarget[x]! * 3;
      const r = light[source[at]!]!;
      const g = light[source[at + 1]!]!;
      const b = light[source[at + 2]!]!;
      line[to]! += share * r;
      line[to + 1]! += share * g;
      line[to + 2]! += share * b;
      if (share < 1) {
        line[to + 3]! += (1 - share) * r;
        line[to + 4]! += (1 - share) * g;
        line[to + 5]! += (1 - share) * b;
      }
    }
    const share = shareInFirst(y, rowStep, row);
    for (let i = 0; i < line.length; i++) sums[i]! += share * line[i]!;
    if (share < 1) for (let i = 0; i < line.length; i++) next[i]! += (1 - share) * line[i]!;
  };

  return {
    push(source, rows) {
      for (let i = 0; i < rows; i++) {
        addLine(source, i * size.width * channels);
        y++;
        if (row < target.height && (y * rowStep >= row + 1 - 1e-9 || y === size.height)) finish();
      }
    },
  };
}

/** Share of source line `y` that falls into target line `row`, the rest falling into the one after. */
function shareInFirst(y: number, step: number, row: number): number {
  const past = (y + 1) * step - (row + 1);
  // Rounding leaves slivers at whole ratios; they are not pixels.
  return past <= 1e-9 ? 1 : 1 - past / step;
}

function spread(width: number, target: number): { firstTarget: Uint32Array; firstShare: Float64Array } {
  const firstTarget = new Uint32Array(width);
  const firstShare = new Float64Array(width);
  const step = target / width;
  for (let x = 0; x < width; x++) {
    const first = Math.min(Math.floor(x * step + 1e-9), target - 1);
    firstTarget[x] = first;
    firstShare[x] = first === target - 1 ? 1 : shareInFirst(x, step, first);
  }
  return { firstTarget, firstShare };
}
