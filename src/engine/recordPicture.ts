import type { ThicknessMap } from '../match/types.ts';
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

/** Every n-th pixel of every n-th row. */
function thinned(map: ThicknessMap): ThicknessMap {
  const stride = Math.ceil(Math.sqrt((map.width * map.height) / MOST_PIXELS));
  if (stride <= 1) return map;
  const width = Math.ceil(map.width / stride);
  const height = Math.ceil(map.height / stride);
  const floats = (from: Float32Array) => pick(from, new Float32Array(width * height));
  const bytes = (from: Uint8Array) => pick(from, new Uint8Array(width * height));
  const pick = <T extends Float32Array | Uint8Array>(from: T, to: T): T => {
    for (let i = 0; i < to.length; i++) {
      to[i] = from[Math.floor(i / width) * stride * map.width + (i % width) * stride]!;
    }
    return to;
  };
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
