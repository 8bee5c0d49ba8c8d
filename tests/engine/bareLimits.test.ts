import { expect, it } from 'vitest';
import { SRGB } from '../../src/colour/rgb.ts';
import { bareLimits } from '../../src/engine/bareLimits.ts';
import type { CodeChart } from '../../src/match/codeChart.ts';
import { seededRandom } from '../../src/scene/random.ts';
import { focalPxFrom35mm, pinholeCamera } from '../../src/view/pinholeCamera.ts';
import { incidenceAtRad, waterView } from '../../src/view/waterView.ts';

const WIDTH = 240;
const HEIGHT = 240;
const DEGREE = Math.PI / 180;
const camera = pinholeCamera(WIDTH, HEIGHT, focalPxFrom35mm(26, WIDTH, HEIGHT));
const view = waterView({ camera, heightM: 3, pitchRad: -35 * DEGREE, rollRad: 0 });
/** Grey bare water that brightens by 200 codes a radian from 55 degrees on and is even before it. */
const bareAt = (rad: number) => 60 + 200 * Math.max(0, rad - 55 * DEGREE);
/** Codes that a square nanometre of thin film adds. */
const PER_NM2 = 0.01;

const incidenceRad = Float64Array.from({ length: 12 }, (_, k) => (20 + 5 * k) * DEGREE);
function chartAt(rad: number): CodeChart {
  const count = 121;
  const thicknessNm = Float64Array.from({ length: count }, (_, j) => j);
  return {
    count,
    thicknessNm,
    codes: Float64Array.from({ length: 3 * count }, (_, i) => bareAt(rad) + PER_NM2 * Math.floor(i / 3) ** 2),
    precision: new Float64Array(6 * count),
    logDeterminant: new Float64Array(count),
    order: new Uint8Array(count),
    sharedSdNm: new Float64Array(count),
    noiseShare: new Float64Array(count),
  };
}
const charts = {
  incidenceRad,
  charts: Array.from(incidenceRad, (rad) => [chartAt(rad)]),
  resolvableNm: new Float64Array(12).fill(1000),
  filmIndex: 1.47,
  ambientIndex: 1,
};

/** Water of which each square of 4 x 4 is tilted by a normal deviate; a third of it lies under film of 90 nm. */
function photo(tiltRad: number) {
  const random = seededRandom(`tilted ${tiltRad}`);
  const codes = new Uint8Array(WIDTH * HEIGHT * 3);
  for (let top = 0; top < HEIGHT; top += 4) {
    for (let left = 0; left < WIDTH; left += 4) {
      const tilt = tiltRad * random.normal();
      const film = random.next() < 1 / 3 ? PER_NM2 * 90 ** 2 : 0;
      for (let k = 0; k < 16; k++) {
        const [x, y] = [left + (k & 3), top + (k >> 2)];
        const rad = incidenceAtRad(view, left + 2, top + 2) + tilt;
        codes.fill(
          Math.round(bareAt(rad) + film + random.next() - 0.5),
          3 * (y * WIDTH + x),
          3 * (y * WIDTH + x) + 3,
        );
      }
    }
  }
  return { width: WIDTH, height: HEIGHT, channels: 3, maxCode: 255, codes, encoding: SRGB } as const;
}

it.each([0.02, 0.05])(
  'reads a tilt of %d radians off the photo and asks for film that outshines it',
  (tilt) => {
    const limits = bareLimits(photo(tilt), null, { charts, view }, 8);
    // At 70 degrees bare water changes by 200 codes a radian: film must add 200 tilt codes (and what noise adds in square).
    const expected = Math.sqrt(Math.hypot(200 * tilt, 0.6) / PER_NM2);
    expect(Math.abs(limits[10]! / expected - 1)).toBeLessThan(0.12);
    // Where brightness does not depend on the angle, waves do nothing: the limit stays as it was.
    expect(limits[2]).toBe(8);
  },
);

it('a photo that shows no bare water has the limit of sheltered water', () => {
  const filmed = { ...photo(0.02), codes: new Uint8Array(WIDTH * HEIGHT * 3).fill(250) };
  const limits = bareLimits(filmed, null, { charts, view }, 8);
  expect(limits[10]).toBe(Math.ceil(Math.sqrt(Math.hypot(200 * 0.01, 0.6) / PER_NM2)));
});
