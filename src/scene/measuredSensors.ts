import { sampleAt } from '../colour/sampled.ts';
import { arriD21 } from './data/arriD21.ts';
import { canonDigitalRebelXti } from './data/canonDigitalRebelXti.ts';
import { canonEos5DMark2 } from './data/canonEos5DMark2.ts';
import { canonPowerShotS90 } from './data/canonPowerShotS90.ts';
import { nikonD700 } from './data/nikonD700.ts';
import { nikonD5100 } from './data/nikonD5100.ts';
import { sonyIlce7Rm2 } from './data/sonyIlce7Rm2.ts';
import { sonyIlce7Sm2 } from './data/sonyIlce7Sm2.ts';

/** A camera as it was measured: 81 values a channel, 380 to 780 nm by 5 nm, relative. */
export interface MeasuredSensor {
  readonly name: string;
  readonly curves: {
    readonly red: readonly number[];
    readonly green: readonly number[];
    readonly blue: readonly number[];
  };
}

/**
 * Cameras measured by others; a scene takes them by its seed, so the order is part of what a draw is. Sources and terms:
 * data/NOTICE.md. None is a phone: no openly licensed measured phone was found.
 */
export const MEASURED_SENSORS: readonly MeasuredSensor[] = [
  { name: 'Sony ILCE-7RM2', curves: sonyIlce7Rm2 },
  { name: 'Canon PowerShot S90', curves: canonPowerShotS90 },
  { name: 'Sony ILCE-7SM2', curves: sonyIlce7Sm2 },
  { name: 'Nikon D5100', curves: nikonD5100 },
  { name: 'Canon EOS 5D Mark II', curves: canonEos5DMark2 },
  { name: 'Nikon D700', curves: nikonD700 },
  { name: 'Canon Digital Rebel XTi', curves: canonDigitalRebelXti },
  { name: 'ARRI D-21', curves: arriD21 },
];

/** The measured camera of a seed: counting from 1, round and round. A seed in words counts as its number of letters. */
export function measuredSensorOf(seed: number | string): MeasuredSensor {
  const place = typeof seed === 'number' ? seed - 1 : seed.length;
  const count = MEASURED_SENSORS.length;
  return MEASURED_SENSORS[((place % count) + count) % count]!;
}

/** A measured camera's curves at the wavelengths given, 3 x n row-major, each of unit sum. Straight lines between nodes. */
export function measuredSensorCurves(sensor: MeasuredSensor, wavelengthNm: Float64Array): Float64Array {
  const n = wavelengthNm.length;
  const out = new Float64Array(3 * n);
  const { red, green, blue } = sensor.curves;
  [red, green, blue].forEach((values, c) => {
    const curve = sampleAt({ startNm: 380, stepNm: 5, values }, wavelengthNm);
    const sum = curve.reduce((total, v) => total + v, 0);
    out.set(
      curve.map((v) => v / sum),
      c * n,
    );
  });
  return out;
}
