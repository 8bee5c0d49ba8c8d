import { describe, expect, it } from 'vitest';
import { parseValidateOptions } from '../../src/cli/validate/options.ts';
import { opticalPathRatio, readScene, throughJpeg } from '../../src/cli/validate/readScene.ts';
import { cells, markdownTable, table, verdict } from '../../src/cli/validate/report.ts';
import { summariseErrors } from '../../src/cli/validate/statistics.ts';
import { nearSteps } from '../../src/cli/validate/steps.ts';
import type { EstimateResult } from '../../src/engine/contract.ts';
import { PIXEL_STATUS } from '../../src/match/types.ts';
import { SCENES } from '../../src/scene/catalogue.ts';
import { STATED } from '../../src/scene/conditions.ts';

const task = { scene: 'oil-lens', conditions: 'stated', seed: 2, width: 96, height: 72 } as const;

/** A map with the same answer everywhere. */
function constantMap(width: number, height: number, nm: number, low: number, high: number): EstimateResult {
  const of = (value: number) => new Float32Array(width * height).fill(value);
  return {
    map: {
      width,
      height,
      thicknessNm: of(nm),
      lowNm: of(low),
      highNm: of(high),
      order: new Uint8Array(width * height),
      status: new Uint8Array(width * height).fill(PIXEL_STATUS.measured),
    },
    summary: {
      calibrated: true,
      counts: { total: 0, inRegion: 0, measured: 0, bare: 0, ambiguous: 0, atLeast: 0, noFilmColour: 0 },
      quantilesNm: null,
      resolvableNm: { fromNm: 0, toNm: 1000 },
      fit: null,
      notices: [],
      timingsMs: {},
    },
    camera: null,
  };
}

describe('reading a scene for the validation', () => {
  it('compares with the truth of the scene itself, film pixel by film pixel', async () => {
    const scene = SCENES['oil-lens']({ ...task, conditions: STATED });
    const truth = scene.thicknessNm.filter((_, i) => scene.kind[i] === 1);
    const reading = await readScene(task, (pixels) =>
      constantMap(pixels.width, pixels.height, 300, 250, 350),
    );
    const figures = summariseErrors([reading.raw]);
    expect(figures.filmPixels).toBe(truth.length);
    expect(figures.offByMoreThan50).toBeCloseTo(
      truth.filter((nm) => Math.abs(nm - 300) > 50).length / truth.length,
      3,
    );
    expect(figures.coverage).toBeCloseTo(
      truth.filter((nm) => nm >= 250 && nm <= 350).length / truth.length,
      12,
    );
    expect(reading.bareHeld).toBe(0);
    expect(reading.barePixels).toBe(scene.kind.filter((kind) => kind === 2).length);
  });

  it('hands the reader what a JPEG of quality 90 leaves, and nothing of the truth', async () => {
    const scene = SCENES['oil-lens']({ ...task, conditions: STATED });
    const jpeg = await throughJpeg(scene.codes, scene.width, scene.height);
    let squares = 0;
    jpeg.forEach((code, i) => {
      squares += (code - scene.codes[i]!) ** 2;
    });
    const rms = Math.sqrt(squares / jpeg.length);
    expect(rms).toBeGreaterThan(0.5);
    expect(rms).toBeLessThan(12);
    await readScene(task, (pixels, setup) => {
      expect(pixels.codes).toEqual(jpeg);
      expect(setup).toEqual(scene.setup);
      return constantMap(pixels.width, pixels.height, 0, 0, 0);
    });
  });

  it('divides the index error out along the optical path', () => {
    const { drawn } = SCENES['oil-lens']({ ...task, conditions: STATED });
    const straight = { ...drawn, incidenceDeg: 0, presetIndex: 1.465, indexError: 0.01 };
    expect(opticalPathRatio(straight)).toBeCloseTo(1.475 / 1.465, 12);
    expect(opticalPathRatio({ ...straight, indexError: 0 })).toBe(1);
    // d n cos(theta in the film), by Snell's law.
    const inside = (n: number) => n * Math.cos(Math.asin(Math.sin(0.6) / n));
    const slanted = { ...straight, incidenceDeg: (0.6 * 180) / Math.PI };
    expect(opticalPathRatio(slanted)).toBeCloseTo(inside(1.475) / inside(1.465), 12);
  });
});

describe('steps of thickness', () => {
  it('are marked three pixels to each side of the jump, and nowhere else', () => {
    const row = Float32Array.of(100, 100, 100, 100, 100, 100, 140, 140, 140, 140, 140, 140);
    expect([...nearSteps(row, 12, 1)]).toEqual([0, 0, 1, 1, 1, 1, 1, 1, 1, 1, 0, 0]);
    // Downwards alike.
    expect([...nearSteps(row, 1, 12)]).toEqual([0, 0, 1, 1, 1, 1, 1, 1, 1, 1, 0, 0]);
  });

  it('do not come from gentle slopes or from where there is no film', () => {
    const slope = Float32Array.of(100, 130, 160, 190, Number.NaN, 900);
    expect(nearSteps(slope, 6, 1).some((mark) => mark === 1)).toBe(false);
  });
});

describe('the command line of the validation', () => {
  it('reads options and has defaults', () => {
    expect(parseValidateOptions([])).toMatchObject({ seed: 1, draws: 3, width: 640, height: 480 });
    expect(
      parseValidateOptions([
        '--scene',
        'oil-lens',
        '--scene',
        'oil-sheen',
        '--draws',
        '2',
        '--size',
        '200x100',
      ]),
    ).toMatchObject({ scenes: ['oil-lens', 'oil-sheen'], draws: 2, width: 200, height: 100 });
  });

  it('refuses what it does not know, with what it knows', () => {
    expect(() => parseValidateOptions(['--scene', 'pond'])).toThrow(
      /no scene "pond"; known are soap-draining/,
    );
    expect(() => parseValidateOptions(['--draws', 'many'])).toThrow(/--draws as a whole number/);
    expect(() => parseValidateOptions(['--size', 'big'])).toThrow(/WIDTHxHEIGHT/);
    expect(() => parseValidateOptions(['--quick'])).toThrow(/--quick/);
  });
});

describe('the printed report', () => {
  const figures = {
    filmPixels: 12345,
    medianNm: 1.234,
    p90Nm: Number.POSITIVE_INFINITY,
    offByMoreThan50: 0.0021,
    withoutAnswer: 0.101,
    coverage: 0.897,
  };

  it('says none where a quantile has no answer', () => {
    expect(cells(figures)).toEqual(['1.2 nm', 'none', '0.21 %', '89.7 %', '10.10 %', '12,345']);
    expect(markdownTable([{ label: '  a scene', figures, note: '' }]).split('\n')[2]).toBe(
      '| a scene | 1.2 nm | none | 0.21 % | 89.7 % | 10.10 % | 12,345 |',
    );
    const [heading, line] = table([{ label: 'a scene', figures, note: 'a note' }]).split('\n');
    expect(heading).toContain('90 % holds');
    expect(line).toMatch(/^a scene .*none.*a note$/);
  });

  it('says which aims are met and which are missed', () => {
    const text = verdict('Oil', 'oil', figures);
    expect(text).toContain('median 1.2 nm (aim 3 nm) met');
    expect(text).toContain('90th percentile none (aim 8 nm) MISSED');
    expect(text).toContain('0.21 % (aim 0.3 %) met');
    expect(text).toContain('89.7 % (aim 88 to 92 %) met');
  });
});
