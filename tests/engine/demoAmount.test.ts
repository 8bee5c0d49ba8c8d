import { readFileSync } from 'node:fs';
import { decode } from 'fast-png';
import { expect, it } from 'vitest';
import { decodePhotoFile } from '../../src/cli/decodePhoto.ts';
import { estimate } from '../../src/engine/estimate.ts';
import { paintedOutside } from '../../src/engine/leftOut.ts';
import { parseSetup } from '../../src/engine/parseSetup.ts';
import { photoViewOf, withPhotoFocal } from '../../src/engine/photoView.ts';
import { tallyPhoto } from '../../src/engine/tally.ts';
import { DEMO_SIZE, demoHarbour } from '../../src/scene/demoScenes.ts';
import { lookAlong, viewAxes, waterAreaM2 } from '../../src/scene/perspective.ts';
import { NO_TRUTH, TRUTH_CODES_PER_NM } from '../../src/scene/truthPicture.ts';

const STEP = 8;

/** Oil in the marked part, by the renderer's own geometry and its picture of the truth. */
function truth(setup: ReturnType<typeof parseSetup>) {
  const { width, height } = DEMO_SIZE;
  const picture = decode(readFileSync('tests/scene/data/harbour-truth.png'));
  const outside = paintedOutside(width, height, setup);
  const small = demoHarbour({ width: width / STEP, height: height / STEP }).view;
  const view = { ...small, widthPx: width, heightPx: height, focalPx: STEP * small.focalPx };
  const axes = viewAxes(view);
  const look = [0, 0, 0];
  let oiledM2 = 0;
  let volumeM3 = 0;
  picture.data.forEach((code, k) => {
    const x = (k % picture.width) * STEP + STEP / 2;
    const y = Math.floor(k / picture.width) * STEP + STEP / 2;
    if (code === NO_TRUTH || code === 0 || outside[y * width + x]) return;
    lookAlong(view, axes, x, y, look);
    const areaM2 = STEP ** 2 * waterAreaM2(view, look);
    oiledM2 += areaM2;
    volumeM3 += (areaM2 * code * 1e-9) / TRUTH_CODES_PER_NM;
  });
  return { oiledM2, volumeM3 };
}

it('the harbour demo opens with a set-up whose amounts hold the truth', async () => {
  const { pixels, metadata } = await decodePhotoFile('public/demo/harbour.jpg');
  const told = parseSetup(JSON.parse(readFileSync('public/demo/harbour.setup.json', 'utf8')));
  const setup = withPhotoFocal(told, metadata);
  const { map } = estimate(pixels, setup);
  const tally = tallyPhoto(map, setup, photoViewOf(setup, pixels.width, pixels.height), {}, { metadata });
  if (tally.scale !== 'metres') throw new Error('no scale');
  const { oiledM2, volumeM3 } = truth(setup);
  const { oiledM2: area, volumeM3: volume } = tally.byThickness;
  // Figures to reach of issue 4: oiled area within 10 %, volume within 20 %, and both intervals hold the truth.
  expect(Math.abs(area.best / oiledM2 - 1)).toBeLessThan(0.1);
  expect(Math.abs(volume.best / volumeM3 - 1)).toBeLessThan(0.2);
  for (const [found, true_] of [
    [area, oiledM2],
    [volume, volumeM3],
  ] as const) {
    expect(found.least).toBeLessThanOrEqual(true_);
    expect(found.most).toBeGreaterThanOrEqual(true_);
  }
}, 180_000);
