import { beforeAll, describe, expect, it } from 'vitest';
import { measureTarget, type TargetReading } from '../../src/engine/measureTarget.ts';
import type { FourCorners } from '../../src/photo/targetColours.ts';
import type { PhotoPixels } from '../../src/photo/types.ts';
import { seededRandom } from '../../src/scene/random.ts';
import { sceneCamera } from '../../src/scene/sceneCamera.ts';
import { drawSigmoid, type ToneCurve } from '../../src/scene/toneCurve.ts';
import { CORNERS, targetPhoto } from './targetPhoto.ts';

interface Drawn {
  readonly coefficients: readonly number[];
  readonly tone: ToneCurve & { readonly shape: 'sigmoid' };
  readonly pixels: PhotoPixels;
  readonly toldK: number;
  readonly reading: TargetReading;
}

const SLOPE = [0.1, -0.06] as const;

async function drawTarget(seed: string, exposure?: number): Promise<Omit<Drawn, 'reading'>> {
  const random = seededRandom(seed);
  const coefficients = Array.from({ length: 9 }, () => random.normal());
  const daylightK = random.uniform(5000, 9000);
  const tone = drawSigmoid(random);
  if (tone.shape !== 'sigmoid') throw new Error('not a sigmoid');
  const gain = () => random.uniform(0.93, 1.07);
  const pixels = await targetPhoto({
    camera: sceneCamera(coefficients, daylightK, random.fork('camera')),
    tone,
    seed,
    gains: [gain(), gain(), gain()],
    slope: SLOPE,
    ...(exposure === undefined ? {} : { exposure }),
  });
  return { coefficients, tone, pixels, toldK: Math.round(daylightK + random.uniform(-500, 500)) };
}

const drawn: Drawn[] = [];
beforeAll(async () => {
  for (let n = 1; n <= 8; n++) {
    const one = await drawTarget(`target ${n}`);
    drawn.push({ ...one, reading: measureTarget(one.pixels, CORNERS, { daylightK: one.toldK }) });
  }
}, 300_000);

const sdOf = ({ reading }: Drawn, i: number) => Math.sqrt(reading.camera.covariance[(i * (i + 1)) / 2 + i]!);

describe('a colour target through cameras drawn at random, its paints a little other than those measured', () => {
  it('gives the tone curve: within its standard deviation as often as it should, and far better than the prior', () => {
    const z = drawn.map((one) => (one.reading.camera.mean[9]! - one.tone.strength) / sdOf(one, 9));
    expect(Math.max(...z.map(Math.abs))).toBeLessThan(3);
    expect(Math.sqrt(z.reduce((sum, v) => sum + v * v, 0) / z.length)).toBeLessThan(1.5);
    // The prior's is 0.25.
    for (const one of drawn) expect(sdOf(one, 9)).toBeLessThan(0.1);
  });

  it('says honestly how little it tells of the sensor: truth within the spread, which stays near the prior', () => {
    let square = 0;
    for (const one of drawn) {
      one.coefficients.forEach((truth, i) => {
        square += ((one.reading.camera.mean[i]! - truth) / sdOf(one, i)) ** 2 / (9 * drawn.length);
        expect(sdOf(one, i)).toBeLessThanOrEqual(1);
      });
      expect(sdOf(one, 2)).toBeGreaterThan(0.5);
    }
    expect(Math.sqrt(square)).toBeLessThan(1.4);
    expect(drawn[0]!.reading.advice).toMatch(/sensor only in part/);
  });

  it('takes out light that falls off across the target', () => {
    // From the middle of the first patch to that of the last, of a grid with gaps of 0.15.
    const along = (5 * 1.15) / (6 + 5 * 0.15);
    const across = (3 * 1.15) / (4 + 3 * 0.15);
    const mean = (k: 0 | 1) =>
      drawn.reduce((sum, { reading }) => sum + Math.log(reading.unevenness[k]), 0) / drawn.length;
    // Paints that differ by 3 % leave 0.02 in each, less in the mean of eight.
    expect(Math.abs(mean(0) - SLOPE[0] * along)).toBeLessThan(0.03);
    expect(Math.abs(mean(1) - SLOPE[1] * across)).toBeLessThan(0.03);
  });

  it('uses all patches and comes within a few codes of them', () => {
    for (const { reading } of drawn) {
      expect(reading.patchesUsed).toBe(24);
      expect(reading.residualCodes).toBeLessThan(4);
      expect(reading.camera.determined).toBe('well');
      expect(reading.camera.from).toBe('target');
    }
  });

  it('finds the first patch whichever corner is given first and whichever way round', () => {
    const { pixels, toldK, reading } = drawn[0]!;
    const [a, b, c, d] = CORNERS;
    const orders: FourCorners[] = [
      [b, c, d, a],
      [c, d, a, b],
      [d, a, b, c],
      [a, d, c, b],
    ];
    for (const corners of orders) {
      const turned = measureTarget(pixels, corners, { daylightK: toldK });
      for (const [i, v] of turned.camera.mean.entries()) expect(v).toBeCloseTo(reading.camera.mean[i]!, 1);
    }
  });

  it('bears corners that are off by a sixth of a patch', () => {
    const one = drawn[1]!;
    const off = CORNERS.map(([x, y], k) => [
      x + (k % 2 ? 8 : -8),
      y + (k < 2 ? 8 : -6),
    ]) as unknown as FourCorners;
    const reading = measureTarget(one.pixels, off, { daylightK: one.toldK });
    expect(Math.abs(reading.camera.mean[9]! - one.reading.camera.mean[9]!)).toBeLessThan(2 * sdOf(one, 9));
  });
});

describe('what is no reading of a target', () => {
  it('is refused with a sentence that says what to do', () => {
    const { pixels } = drawn[0]!;
    const [a, b, c, d] = CORNERS;
    expect(() => measureTarget(pixels, [a, c, b, d])).toThrow(/cross over/);
    expect(() =>
      measureTarget(pixels, [
        [10, 10],
        [60, 10],
        [60, 40],
        [10, 40],
      ]),
    ).toThrow(/too small/);
    const elsewhere: FourCorners = [
      [70, 60],
      [240, 66],
      [240, 180],
      [70, 170],
    ];
    expect(() => measureTarget(pixels, elsewhere)).toThrow(/not those of the 24-patch target/);
  });

  it('an overexposed target is refused, a slightly overexposed one leaves out its brightest patches', async () => {
    const bright = await drawTarget('bright', 1.25);
    const reading = measureTarget(bright.pixels, CORNERS, { daylightK: bright.toldK });
    expect(reading.patchesUsed).toBeLessThan(24);
    const white = await drawTarget('white', 8);
    expect(() => measureTarget(white.pixels, CORNERS, { daylightK: white.toldK })).toThrow(/less exposure/);
  });
});
