import { KDTree } from 'mnemonist';
import sharp from 'sharp';
import { bench, describe } from 'vitest';
import { SRGB } from '../../src/colour/rgb.ts';
import { calibrate } from '../../src/engine/calibrate.ts';
import { leftOutOf } from '../../src/engine/leftOut.ts';
import { activityMap } from '../../src/match/activity.ts';
import { MOST_CANDIDATES, makeCandidateField } from '../../src/match/candidates.ts';
import { fillCandidates } from '../../src/match/mapPixels.ts';
import { makePixelReader } from '../../src/match/pixelReader.ts';
import { resolveOrders } from '../../src/match/resolveOrders.ts';
import type { PhotoPixels } from '../../src/photo/types.ts';
import { SCENES } from '../../src/scene/catalogue.ts';
import { CONDITIONS } from '../../src/scene/conditions.ts';
import { plainSemiGlobal } from './plainSemiGlobal.ts';

const WIDTH = 2000;
const HEIGHT = 1500;

const scene = SCENES['soap-draining']({
  width: WIDTH,
  height: HEIGHT,
  seed: 1,
  conditions: CONDITIONS.stated,
});
const jpeg = await sharp(Buffer.from(scene.codes), { raw: { width: WIDTH, height: HEIGHT, channels: 3 } })
  .jpeg({ quality: 90, chromaSubsampling: '4:2:0' })
  .toBuffer();
const codes = new Uint8Array(await sharp(jpeg).raw().toBuffer());
const pixels: PhotoPixels = {
  width: WIDTH,
  height: HEIGHT,
  codes,
  channels: 3,
  maxCode: 255,
  encoding: SRGB,
};
const leftOut = leftOutOf(pixels, scene.setup);
const activity = activityMap(pixels);
const calibration = calibrate(pixels, scene.setup, leftOut, activity);
const chart = calibration.charts[0]!;

/** Thickness of the nearest chart colour for every pixel, trying every label. */
function bruteForce(): Float32Array {
  const out = new Float32Array(WIDTH * HEIGHT);
  for (let i = 0; i < out.length; i++) {
    let best = Number.POSITIVE_INFINITY;
    let at = 0;
    for (let j = 0; j < chart.count; j++) {
      const r = codes[3 * i]! - chart.codes[3 * j]!;
      const g = codes[3 * i + 1]! - chart.codes[3 * j + 1]!;
      const b = codes[3 * i + 2]! - chart.codes[3 * j + 2]!;
      const d = r * r + g * g + b * b;
      if (d < best) {
        best = d;
        at = j;
      }
    }
    out[i] = chart.thicknessNm[at]!;
  }
  return out;
}

const axes = [0, 1, 2].map((c) =>
  Float64Array.from({ length: chart.count }, (_, j) => chart.codes[3 * j + c]!),
);
const tree = KDTree.fromAxes(
  axes,
  Array.from({ length: chart.count }, (_, j) => j),
);

const once = { iterations: 2, warmupIterations: 0, time: 0, warmupTime: 0 };

describe('match of 3 megapixels: full posterior of every colour against nearest chart colour', () => {
  bench(
    'ours: modes with intervals, each colour once',
    () => {
      const reader = makePixelReader(pixels, activity, calibration.charts);
      for (let y = 0; y < HEIGHT; y++) for (let x = 0; x < WIDTH; x++) reader.lookUp(x, y);
    },
    once,
  );
  bench('brute force: nearest chart colour', () => void bruteForce(), once);
  bench(
    'k-d tree (mnemonist): nearest chart colour',
    () => {
      for (let i = 0; i < WIDTH * HEIGHT; i++)
        tree.nearestNeighbor([codes[3 * i]!, codes[3 * i + 1]!, codes[3 * i + 2]!]);
    },
    once,
  );
});

describe('orders of 160 x 120 places: sparse readings against a full label grid', () => {
  const field = makeCandidateField(160, 120, 12);
  fillCandidates(
    pixels,
    makePixelReader(pixels, activity, calibration.charts),
    calibration.rules,
    leftOut,
    field,
    0,
    120,
  );
  bench('ours: eight paths over up to five readings', () => void resolveOrders(field), once);
  const labels = Math.ceil(chart.count / 4);
  const cost = new Float32Array(160 * 120 * labels);
  for (let i = 0; i < 160 * 120; i++) {
    for (let label = 0; label < labels; label++) {
      let least = 6;
      for (let k = 0; k < field.count[i]!; k++) {
        const at = i * MOST_CANDIDATES + k;
        const gap = (field.thicknessNm[at]! - label * 4) / Math.max(2, field.sdNm[at]!);
        least = Math.min(least, field.cost[at]! + (gap * gap) / 2);
      }
      cost[i * labels + label] = least;
    }
  }
  bench(
    'plain semi-global matching: four paths, a label every 4 nm',
    () => void plainSemiGlobal(160, 120, labels, cost),
    once,
  );
});
