import { DAYLIGHT_S0, DAYLIGHT_S1, DAYLIGHT_S2 } from './data/daylight.ts';
import { FL2, FL11, LED_B1, LED_B2, LED_B3, LED_B4, LED_B5 } from './data/lamps.ts';
import { D50, D65 } from './data/standardIlluminants.ts';
import { type Sampled, sampleAt } from './sampled.ts';
import type { IlluminantId, Light } from './types.ts';

/** Range of the CIE's daylight locus, kelvin. */
export const DAYLIGHT_RANGE_K = [4000, 25000] as const;

/**
 * Chromaticity of CIE daylight of a correlated colour temperature. CIE 15:2018, equations 4.8 to 4.10.
 *
 * The CIE's two cubics do not quite meet at 7000 K: x drops by 4.6e-7 there, a spectrum by less than 0.001 of its 100.
 * @throws RangeError outside 4000..25000 K
 */
export function daylightChromaticity(cctK: number): readonly [number, number] {
  if (!(cctK >= DAYLIGHT_RANGE_K[0] && cctK <= DAYLIGHT_RANGE_K[1])) {
    throw new RangeError(
      `Daylight is defined from 4000 to 25000 K; ${cctK} K is outside. For the warmer light of a lamp choose an illuminant, such as A.`,
    );
  }
  const t = cctK;
  const x =
    t <= 7000
      ? -4.607e9 / t ** 3 + 2.9678e6 / t ** 2 + 0.09911e3 / t + 0.244063
      : -2.0064e9 / t ** 3 + 1.9018e6 / t ** 2 + 0.24748e3 / t + 0.23704;
  return [x, -3 * x * x + 2.87 * x - 0.275];
}

const COMPONENTS: readonly Sampled[] = [DAYLIGHT_S0, DAYLIGHT_S1, DAYLIGHT_S2].map((values) => ({
  startNm: 300,
  stepNm: 5,
  values,
}));

/** Weights M1, M2 of the daylight components at a chromaticity. CIE 15:2018, equation 4.11. */
export function daylightWeights([x, y]: readonly [number, number]): readonly [number, number] {
  const m = 0.0241 + 0.2562 * x - 0.7341 * y;
  return [(-1.3515 - 1.7703 * x + 5.9114 * y) / m, (0.03 - 31.4424 * x + 30.0717 * y) / m];
}

/** S0 + m1 S1 + m2 S2 at the wavelengths given. */
export function daylightFromWeights(m1: number, m2: number, wavelengthNm: Float64Array): Float64Array {
  const [s0, s1, s2] = COMPONENTS.map((component) => sampleAt(component, wavelengthNm));
  return s0!.map((v, i) => v + m1 * s1![i]! + m2 * s2![i]!);
}

/**
 * Relative spectral power of CIE daylight, about 100 at 560 nm; smooth in temperature (M1, M2 not rounded) but for the
 * tiny step at 7000 K that `daylightChromaticity` tells of. The figures reach from 300 to 830 nm; zero beyond.
 * @throws RangeError outside 4000..25000 K
 */
export function daylightSpectrum(cctK: number, wavelengthNm: Float64Array): Float64Array {
  const [m1, m2] = daylightWeights(daylightChromaticity(cctK));
  return daylightFromWeights(m1, m2, wavelengthNm);
}

/** Second radiation constant over the one that the nominal D names were made with. */
const C2_RATIO = 1.4388 / 1.438;

/** A nominal D illuminant by the CIE's recipe: temperature times 1.4388/1.4380, M1 and M2 rounded to three decimals. */
function nominalDaylight(nominalK: number, wavelengthNm: Float64Array): Float64Array {
  const [m1, m2] = daylightWeights(daylightChromaticity(nominalK * C2_RATIO));
  return daylightFromWeights(Math.round(m1 * 1000) / 1000, Math.round(m2 * 1000) / 1000, wavelengthNm);
}

/** Standard illuminant A. ISO/CIE 11664-2, equation 1. */
function illuminantA(wavelengthNm: Float64Array): Float64Array {
  const reference = Math.exp(1.435e7 / (2848 * 560)) - 1;
  return wavelengthNm.map((l) => (100 * (560 / l) ** 5 * reference) / (Math.exp(1.435e7 / (2848 * l)) - 1));
}

const TABLES: Partial<Record<IlluminantId, Sampled>> = {
  D50: { startNm: 300, stepNm: 5, values: D50 },
  D65: { startNm: 300, stepNm: 5, values: D65 },
  FL2: { startNm: 380, stepNm: 5, values: FL2 },
  FL11: { startNm: 380, stepNm: 5, values: FL11 },
  'LED-B1': { startNm: 380, stepNm: 5, values: LED_B1 },
  'LED-B2': { startNm: 380, stepNm: 5, values: LED_B2 },
  'LED-B3': { startNm: 380, stepNm: 5, values: LED_B3 },
  'LED-B4': { startNm: 380, stepNm: 5, values: LED_B4 },
  'LED-B5': { startNm: 380, stepNm: 5, values: LED_B5 },
};

/** Names of the illuminants at hand. */
export const ILLUMINANT_IDS: readonly IlluminantId[] = [
  'A',
  'D50',
  'D55',
  'D65',
  'D75',
  'FL2',
  'FL11',
  'LED-B1',
  'LED-B2',
  'LED-B3',
  'LED-B4',
  'LED-B5',
];

/**
 * Relative spectral power of a light at the wavelengths given; linear between 5 nm nodes by CIE rule.
 * Tables end at 780 nm; zero beyond. Lines of FL2 and FL11 are spread over their 5 nm bins, as the CIE's 5 nm tables do.
 * @throws RangeError for a colour temperature or name that is not known
 */
export function lightSpectrum(light: Light, wavelengthNm: Float64Array): Float64Array {
  if ('daylightK' in light) return daylightSpectrum(light.daylightK, wavelengthNm);
  const id = light.illuminant;
  if (id === 'A') return illuminantA(wavelengthNm);
  if (id === 'D55') return nominalDaylight(5500, wavelengthNm);
  if (id === 'D75') return nominalDaylight(7500, wavelengthNm);
  const table = Object.hasOwn(TABLES, id) ? TABLES[id] : undefined;
  if (!table) throw new RangeError(`There is no illuminant "${id}"; known are ${ILLUMINANT_IDS.join(', ')}.`);
  return sampleAt(table, wavelengthNm);
}
