import { bench, describe } from 'vitest';
import { seededRandom } from '../../src/scene/random.ts';
import { cellSums } from '../../src/tally/cellSums.ts';
import { commonDraw } from '../../src/tally/commonDraw.ts';
import { oiledArea } from '../../src/tally/oiledArea.ts';
import { volumeFromSums } from '../../src/tally/volumeByThickness.ts';
import { areaCells } from '../../src/view/areaCells.ts';
import { focalPxFrom35mm, pinholeCamera } from '../../src/view/pinholeCamera.ts';
import { posesFromTilt } from '../../src/view/poseDraws.ts';
import { groundAreaField, incidenceField } from '../../src/view/waterFields.ts';
import { waterView } from '../../src/view/waterView.ts';
import { bare, film, madeMap } from './fields.ts';

const [width, height] = [4000, 3000];
const camera = pinholeCamera(width, height, focalPxFrom35mm(26, width, height));
const view = waterView({ camera, heightM: 4, pitchRad: -0.5, rollRad: 0.01 });
const map = madeMap(width, height, (x, y) =>
  ((x >> 6) + (y >> 6)) % 3 === 0 ? bare : film(100 + (x % 500)),
);
const areaM2 = groundAreaField(view);
const cells = areaCells(width, height);
const sums = cellSums({ map, areaM2 }, cells);
const draw = commonDraw(
  view,
  cells,
  posesFromTilt(view, { heightShare: 0.05, focalShare: 0.02, pitchRad: 0.01, rollRad: 0.01 }),
  { index: 1.47, indexSd: 0.015 },
);
const options = { time: 2000, warmupTime: 200 };

describe('12 megapixels', () => {
  bench('incidence field', () => void incidenceField(view), options);
  bench('ground area field', () => void groundAreaField(view), options);
  bench('oiled area', () => void oiledArea({ map, areaM2 }), options);
  bench('sums over cells', () => void cellSums({ map, areaM2 }, cells), options);
  bench('2000 trials', () => void volumeFromSums(sums, draw, seededRandom(1)), options);
});
