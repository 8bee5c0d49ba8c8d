import { PIXEL_STATUS, type ThicknessMap } from '../match/types.ts';
import { encodeRgbPng, pngTexts } from '../record/png.ts';
import { niceTop, paintMap } from '../record/thicknessColours.ts';

/** A picture of a map shows at most this many pixels; the map itself keeps them all. */
const MOST_PIXELS = 1_200_000;

/** The thickness at the light end of the ramp stands in the picture itself, so that its legend can be drawn later. */
const TOP = 'topNm';

/** The map painted for reports and lists, as PNG. */
export function pictureOf(map: ThicknessMap): Uint8Array {
  const { width, height, ...layers } = thinned(map);
  const topNm = niceTop(map);
  const { rgb } = paintMap({ width, height, ...layers }, topNm);
  return encodeRgbPng({ width, height, rgb, texts: { [TOP]: String(topNm) } });
}

/** Thickness at the light end of a picture's ramp, nm; null where the picture does not say. */
export function topOf(png: Uint8Array): number | null {
  const topNm = Number(pngTexts(png)[TOP]);
  return topNm > 0 ? topNm : null;
}

interface Box {
  readonly left: number;
  readonly top: number;
  readonly width: number;
  readonly height: number;
}

/** Space kept around what was looked at, as a share of its size. */
const MARGIN = 0.04;

/** The part of the map that was looked at, with a margin; all of it where nothing was. */
function lookedAt({ width, height, status }: ThicknessMap): Box {
  let [left, top, right, bottom] = [width, height, -1, -1];
  for (let y = 0; y < height; y++) {
    for (let x = 0; x < width; x++) {
      if (status[y * width + x] === PIXEL_STATUS.outside) continue;
      left = Math.min(left, x);
      right = Math.max(right, x);
      top = Math.min(top, y);
      bottom = Math.max(bottom, y);
    }
  }
  if (right < 0) return { left: 0, top: 0, width, height };
  const margin = Math.ceil(MARGIN * Math.max(right - left, bottom - top));
  left = Math.max(0, left - margin);
  top = Math.max(0, top - margin);
  return {
    left,
    top,
    width: Math.min(width, right + 1 + margin) - left,
    height: Math.min(height, bottom + 1 + margin) - top,
  };
}

/** Every n-th pixel of every n-th row of the part that was looked at. */
function thinned(map: ThicknessMap): ThicknessMap {
  const box = lookedAt(map);
  const stride = Math.max(1, Math.ceil(Math.sqrt((box.width * box.height) / MOST_PIXELS)));
  const width = Math.ceil(box.width / stride);
  const height = Math.ceil(box.height / stride);
  const pick = <T extends Float32Array | Uint8Array>(from: T, to: T): T => {
    for (let i = 0; i < to.length; i++) {
      const x = box.left + (i % width) * stride;
      const y = box.top + Math.floor(i / width) * stride;
      to[i] = from[y * map.width + x]!;
    }
    return to;
  };
  const floats = (from: Float32Array) => pick(from, new Float32Array(width * height));
  const bytes = (from: Uint8Array) => pick(from, new Uint8Array(width * height));
  return {
    width,
    height,
    thicknessNm: floats(map.thicknessNm),
    lowNm: floats(map.lowNm),
    highNm: floats(map.highNm),
    order: bytes(map.order),
    status: bytes(map.status),
  };
}
