import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { horizonDipRad, horizonInPhoto, horizonTiltSd, tiltFromHorizon } from '../../src/view/horizon.ts';
import { pinholeCamera } from '../../src/view/pinholeCamera.ts';
import { tiltFromSensor } from '../../src/view/tiltSensor.ts';

const DEGREE = Math.PI / 180;
const camera = pinholeCamera(4000, 3000, 2900);

describe('tilt from the horizon', () => {
  it('marks taken off the horizon that a tilt gives lead back to the tilt', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -20, max: 20, noNaN: true }),
        fc.double({ min: -25, max: 25, noNaN: true }),
        fc.double({ min: 0, max: 400, noNaN: true }),
        (pitchDeg, rollDeg, heightM) => {
          const tilt = { pitchRad: pitchDeg * DEGREE, rollRad: rollDeg * DEGREE };
          const dip = horizonDipRad(heightM);
          const line = horizonInPhoto(camera, tilt, dip);
          fc.pre(line.length > 8);
          const back = tiltFromHorizon(camera, line[0]!, line.at(-1)!, dip);
          expect(Math.abs(back.pitchRad - tilt.pitchRad)).toBeLessThan(1e-9);
          expect(Math.abs(back.rollRad - tilt.rollRad)).toBeLessThan(1e-9);
        },
      ),
    );
  });

  it('does not mind which mark comes first, nor distortion', () => {
    const bent = pinholeCamera(4000, 3000, 2900, -0.08);
    const tilt = { pitchRad: -12 * DEGREE, rollRad: 4 * DEGREE };
    const line = horizonInPhoto(bent, tilt, 0.002);
    const back = tiltFromHorizon(bent, line.at(-1)!, line[0]!, 0.002);
    expect(back.pitchRad).toBeCloseTo(tilt.pitchRad, 10);
    expect(back.rollRad).toBeCloseTo(tilt.rollRad, 10);
  });

  it('a level horizon through the middle is a level camera; above the middle, the camera looks down', () => {
    const level = tiltFromHorizon(camera, [100, 1500], [3900, 1500], 0);
    expect(level.pitchRad).toBeCloseTo(0, 12);
    expect(level.rollRad).toBeCloseTo(0, 12);
    expect(tiltFromHorizon(camera, [100, 700], [3900, 700], 0).pitchRad).toBeCloseTo(
      -Math.atan(800 / 2900),
      12,
    );
  });

  it('a horizon that falls to the right means a camera turned anticlockwise', () => {
    expect(tiltFromHorizon(camera, [0, 1400], [4000, 1600], 0).rollRad).toBeCloseTo(
      -Math.atan(200 / 4000),
      12,
    );
  });

  it('the dip lowers the horizon by itself', () => {
    const dip = horizonDipRad(100);
    // At the photo's edge, 34.6 degrees off the axis, the elevation's sine is that of the pitch times its cosine.
    const pitchRad = -Math.asin(Math.sin(dip) / Math.cos(Math.atan(2000 / 2900)));
    expect(tiltFromHorizon(camera, [0, 1500], [4000, 1500], dip).pitchRad).toBeCloseTo(pitchRad, 12);
    const [x, y] = horizonInPhoto(camera, { pitchRad: 0, rollRad: 0 }, dip).find(
      (place) => Math.abs(place[0] - 2000) < 1e-6,
    )!;
    expect(x).toBeCloseTo(2000, 6);
    expect(y).toBeCloseTo(1500 + 2900 * Math.tan(dip), 6);
  });

  it('taps that stray by two pixels move the pitch by about two thirds of a milliradian over root two', () => {
    const sd = horizonTiltSd(camera, [200, 900], [3800, 900], 2);
    expect(sd.pitchRad).toBeGreaterThan(0.8 * (2 / 2900 / Math.SQRT2));
    expect(sd.pitchRad).toBeLessThan(1.2 * (2 / 2900 / Math.SQRT2));
    expect(sd.rollRad).toBeCloseTo((2 * Math.SQRT2) / 3600, 4);
  });

  it('refuses marks too close together and heights below the water', () => {
    expect(() => tiltFromHorizon(camera, [100, 100], [150, 100], 0)).toThrow(/too close together/);
    expect(() => horizonDipRad(-1)).toThrow(/must not be negative/);
  });

  it('no horizon in a photo that looks straight down', () => {
    expect(horizonInPhoto(camera, { pitchRad: -Math.PI / 2, rollRad: 0 }, 0)).toEqual([]);
  });
});

describe('tilt from the sensor', () => {
  const at = (beta: number, gamma: number, angle = 0) => {
    const { pitchRad, rollRad } = tiltFromSensor(beta, gamma, angle);
    return [pitchRad / DEGREE, rollRad / DEGREE];
  };

  it('a phone held upright looks level, laid face up looks straight down', () => {
    expect(at(90, 0)[0]).toBeCloseTo(0, 9);
    expect(at(90, 0)[1]).toBeCloseTo(0, 9);
    expect(at(0, 0)[0]).toBeCloseTo(-90, 9);
  });

  it('half way between looks 45 degrees down', () => {
    expect(at(45, 0)[0]).toBeCloseTo(-45, 9);
    expect(at(45, 0)[1]).toBeCloseTo(0, 9);
  });

  it('on its left side (screen angle 90), gamma holds the pitch', () => {
    // Lying on the left edge with the screen to the person: beta 0, gamma -90.
    expect(at(0, -90, 90)[0]).toBeCloseTo(0, 9);
    expect(at(0, -90, 90)[1]).toBeCloseTo(0, 9);
    expect(at(0, -60, 90)[0]).toBeCloseTo(-30, 9);
    expect(at(0, 60, 270)[0]).toBeCloseTo(-30, 9);
    expect(at(0, 60, 270)[1]).toBeCloseTo(0, 9);
  });

  it('says what to do when the sensor is silent', () => {
    expect(() => tiltFromSensor(Number.NaN, 0)).toThrow(/mark the horizon/);
  });
});
