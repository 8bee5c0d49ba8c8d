import { PIXEL_STATUS, type ThicknessMap } from '../match/types.ts';
import { inTurns, pause } from './turns.ts';

export interface MapPicture {
  readonly bitmap: ImageBitmap;
  readonly topNm: number;
  readonly ramp: Uint8Array;
  /** The highest interference order on the map, 0 where there is none. */
  readonly orders: number;
}

/** Colours of orders: alternating light and dark of one ramp, so that neighbours always differ. */
const ORDER_STEPS = [0.35, 0.85, 0.5, 1, 0.6, 0.92, 0.45, 0.75];
/** The stage shows at most this many pixels of a map; the map itself keeps them all. */
const MOST_PIXELS = 1_500_000;
/** Rows painted at once: a multiple of the patterns' period. */
const BAND = 32;

/** Paints a map for the stage, in short turns. The painter comes lazily: it brings the colour library. */
export async function mapPicture(map: ThicknessMap, view: 'thickness' | 'order'): Promise<MapPicture> {
  const { niceTop, paintMap, thicknessRamp } = await import('../record/thicknessColours.ts');
  const stride = Math.max(1, Math.ceil(Math.sqrt((map.width * map.height) / MOST_PIXELS)));
  const width = Math.ceil(map.width / stride);
  const height = Math.ceil(map.height / stride);
  const topNm = view === 'thickness' ? niceTop(thinBand(map, view, 0, height, stride, width)) : 1;
  await pause();
  const pixels = new Uint8ClampedArray(4 * width * height);
  const breathe = inTurns();
  for (let y = 0; y < height; y += BAND) {
    const rows = Math.min(BAND, height - y);
    const band = thinBand(map, view, y, rows, stride, width);
    const { rgb } = paintMap(band, topNm);
    let to = 4 * y * width;
    for (let i = 0; i < rows * width; i++) {
      pixels[to++] = rgb[3 * i] ?? 0;
      pixels[to++] = rgb[3 * i + 1] ?? 0;
      pixels[to++] = rgb[3 * i + 2] ?? 0;
      pixels[to++] = opacityOf(band.status[i] ?? 0);
    }
    await breathe();
  }
  return {
    bitmap: await createImageBitmap(new ImageData(pixels, width, height)),
    topNm,
    ramp: thicknessRamp(),
    orders: highestOrder(map, stride),
  };
}

/** Every `stride`-th pixel of every `stride`-th row, as a map of `rows` rows from thinned row `y` on. */
function thinBand(
  map: ThicknessMap,
  view: 'thickness' | 'order',
  y: number,
  rows: number,
  stride: number,
  width: number,
): ThicknessMap {
  const thicknessNm = new Float32Array(width * rows);
  const status = new Uint8Array(width * rows);
  for (let row = 0; row < rows; row++) {
    const from = Math.min(map.height - 1, (y + row) * stride) * map.width;
    for (let x = 0; x < width; x++) {
      const i = from + Math.min(map.width - 1, x * stride);
      const out = row * width + x;
      status[out] = map.status[i] ?? 0;
      thicknessNm[out] = view === 'thickness' ? (map.thicknessNm[i] ?? 0) : orderStep(map.order[i] ?? 255);
    }
  }
  return { width, height: rows, thicknessNm, lowNm: thicknessNm, highNm: thicknessNm, order: status, status };
}

/** Place on the ramp, 0 to 1, at which an order is painted in the order map. */
export function orderStep(order: number): number {
  return order === 255 || order === 0 ? 0 : (ORDER_STEPS[(order - 1) % ORDER_STEPS.length] ?? 1);
}

/** The photo shows through where nothing was read, so that hull, quay and glint stay recognisable. */
function opacityOf(status: number): number {
  if (status === PIXEL_STATUS.outside) return 0;
  return status === PIXEL_STATUS.noFilmColour ? 150 : 255;
}

/** The highest order among every `stride`-th pixel: a rarer one could not be seen on the stage. */
function highestOrder({ order }: ThicknessMap, stride: number): number {
  let highest = 0;
  for (let i = 0; i < order.length; i += stride) {
    const here = order[i] ?? 0;
    if (here > highest && here !== 255) highest = here;
  }
  return highest;
}
