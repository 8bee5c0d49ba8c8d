/** What is true of the harbour demo photo, by the renderer's own geometry. */
import sharp from 'sharp';
import { paintedOutside } from '../../src/engine/leftOut.ts';
import type { Setup } from '../../src/engine/setup.ts';
import { demoHarbour } from '../../src/scene/demoScenes.ts';
import {
  incidenceRad,
  lookAlong,
  type PinholeView,
  viewAxes,
  waterAreaM2,
} from '../../src/scene/perspective.ts';
import { NO_TRUTH, TRUTH_CODES_PER_NM } from '../../src/scene/truthPicture.ts';

/** Upright size of the rendered harbour photo, and of a picture pixel of its truth. */
export const PHOTO = { width: 1200, height: 1600 };
const TRUTH_STEP = 8;
/** The renderer's own camera, from a small picture of the same draw. */
export function trueView(): PinholeView {
  const small = demoHarbour({ width: PHOTO.width / 8, height: PHOTO.height / 8 }).view;
  return { ...small, widthPx: PHOTO.width, heightPx: PHOTO.height, focalPx: 8 * small.focalPx };
}

/** Where a picture place lies on the water by the renderer's geometry, metres. */
export function onWater(view: PinholeView, x: number, y: number): readonly [number, number] {
  const look = [0, 0, 0];
  lookAlong(view, viewAxes(view), x, y, look);
  const reach = view.heightM / -(look[2] ?? Number.NaN);
  return [(look[0] ?? 0) * reach, (look[1] ?? 0) * reach];
}

export interface Truth {
  readonly oiledM2: number;
  readonly volumeM3: number;
  readonly heightM: number;
}

/** Oil that lies in the painted part and is not seen too flat, from the renderer's own geometry and truth picture. */
export async function truthIn(setup: Setup): Promise<Truth> {
  const picture = sharp('tests/scene/data/harbour-truth.png');
  const { width, height } = await picture.metadata();
  const codes = await picture.toColourspace('grey16').raw({ depth: 'ushort' }).toBuffer();
  const outside = paintedOutside(PHOTO.width, PHOTO.height, setup);
  const view = trueView();
  const axes = viewAxes(view);
  const look = [0, 0, 0];
  let oiledM2 = 0;
  let volumeM3 = 0;
  for (let j = 0; j < height; j++) {
    for (let i = 0; i < width; i++) {
      const code = codes.readUInt16LE(2 * (j * width + i));
      const [x, y] = [i * TRUTH_STEP + TRUTH_STEP / 2, j * TRUTH_STEP + TRUTH_STEP / 2];
      if (code === NO_TRUTH || code === 0 || outside[y * PHOTO.width + x]) continue;
      lookAlong(view, axes, x, y, look);
      if (incidenceRad(look) > (75 * Math.PI) / 180) continue;
      const areaM2 = TRUTH_STEP ** 2 * waterAreaM2(view, look);
      oiledM2 += areaM2;
      volumeM3 += (areaM2 * code * 1e-9) / TRUTH_CODES_PER_NM;
    }
  }
  return { oiledM2, volumeM3, heightM: view.heightM };
}
