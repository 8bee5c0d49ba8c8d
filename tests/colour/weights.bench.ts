import { differenceCiede2000 } from 'culori';
import { bench, describe } from 'vitest';
import { applyWeights } from '../../src/colour/applyWeights.ts';
import { matrixMaker } from '../../src/colour/cameraMatrix.ts';
import { deltaE2000 } from '../../src/colour/deltaE2000.ts';
import { cameraWeights } from '../../src/colour/photoCamera.ts';
import { SRGB } from '../../src/colour/rgb.ts';
import { FILM_WAVELENGTHS_NM } from '../../src/colour/sampled.ts';

const light = { daylightK: 6500 };
const mean = new Float64Array(9);

describe('camera', () => {
  const weights = cameraWeights(mean, light, SRGB, FILM_WAVELENGTHS_NM);
  const table = Float64Array.from(
    { length: 5000 * FILM_WAVELENGTHS_NM.length },
    (_, i) => (1 + Math.sin(i)) / 20,
  );
  const out = new Float64Array(3 * 5000);
  bench('5000 film spectra to linear RGB', () => {
    applyWeights(weights, table, out);
  });

  const { matrixFor } = matrixMaker(light, SRGB, FILM_WAVELENGTHS_NM);
  bench('one colour matrix', () => {
    matrixFor(mean);
  });
});

describe('10 000 colour differences', () => {
  const lab = Float64Array.from({ length: 3 * 10001 }, (_, i) => 50 + 40 * Math.sin(i * 1.7));
  const found = new Float64Array(10000);
  bench('ours', () => {
    for (let k = 0; k < 10000; k++) found[k] = deltaE2000(lab, k, lab, k + 1);
  });
  const difference = differenceCiede2000();
  const colours = Array.from({ length: 10001 }, (_, k) => ({
    mode: 'lab65' as const,
    l: lab[3 * k]!,
    a: lab[3 * k + 1]!,
    b: lab[3 * k + 2]!,
  }));
  bench('culori', () => {
    for (let k = 0; k < 10000; k++) found[k] = difference(colours[k]!, colours[k + 1]!);
  });
});
