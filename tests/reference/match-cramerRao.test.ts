/**
 * Cramér (1946, 32.3) and Rao (1945): no unbiased reading of d from codes with mean m(d) and covariance S scatters less
 * than 1 / sqrt(m'(d)^T S^-1 m'(d)).
 */
import { describe, expect, it } from 'vitest';
import { buildCodeChart } from '../../src/match/buildCodeChart.ts';
import { type CodeChart, searchable } from '../../src/match/codeChart.ts';
import { MODE_FIELDS, makeModes, posteriorReader } from '../../src/match/posterior.ts';
import { seededRandom } from '../../src/scene/random.ts';
import { fitAt, plausibleParameters, soapModel } from '../match/soapModel.ts';

const NOISE_CODES = 2;
const DRAWS = 4000;

const chart: CodeChart = buildCodeChart(
  soapModel(1, 1200),
  fitAt(plausibleParameters()),
  { codes: [NOISE_CODES, NOISE_CODES, NOISE_CODES], luma: 0, chroma: 0 },
  { factor: 1, perIndex: 0, relativeSd: 0 },
  () => 1,
);

/** The bound at label j by the chart's slope over two nanometres; the noise is 2 codes a channel, independent. */
function boundNm(j: number): number {
  const slope = (c: number) => (chart.codes[3 * (j + 1) + c]! - chart.codes[3 * (j - 1) + c]!) / 2;
  return NOISE_CODES / Math.hypot(slope(0), slope(1), slope(2));
}

describe('spread of readings against the Cramér-Rao bound, 2 codes of noise', () => {
  const read = posteriorReader(searchable(chart));
  const modes = makeModes();

  // Stretches where colours change and no other order looks alike; the bound is first order, so not at a turn.
  it.each([60, 150, 190, 280, 330, 420, 480])('at %i nm it is within 10 %% of the bound', (j) => {
    const random = seededRandom(`bound/${j}`);
    let sum = 0;
    let square = 0;
    let otherOrder = 0;
    for (let n = 0; n < DRAWS; n++) {
      const [r, g, b] = [0, 1, 2].map((c) => chart.codes[3 * j + c]! + NOISE_CODES * random.normal());
      read(r!, g!, b!, modes);
      const error = modes.values[0]! - chart.thicknessNm[j]!;
      if (modes.count > 1 && modes.values[MODE_FIELDS + 3]! < modes.values[3]! + 6) otherOrder++;
      sum += error;
      square += error * error;
    }
    // A single order: hardly a draw has another reading within a factor 20 of density.
    expect(otherOrder / DRAWS).toBeLessThan(0.001);
    const mean = sum / DRAWS;
    const spread = Math.sqrt(square / DRAWS - mean * mean);
    expect(Math.abs(mean)).toBeLessThan(0.3 * boundNm(j));
    // The spread of 4000 draws is itself sure to 1.1 %.
    expect(spread / boundNm(j)).toBeGreaterThan(0.9);
    expect(spread / boundNm(j)).toBeLessThan(1.1);
  });
});
