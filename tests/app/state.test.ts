import { beforeEach, describe, expect, it } from 'vitest';
import {
  addPin,
  begin,
  beginMarking,
  canRedo,
  canUndo,
  change,
  DEFAULT_SETUP,
  keepResult,
  marking,
  onWater,
  preview,
  redo,
  result,
  selected,
  setReference,
  setRegion,
  setup,
  undo,
} from '../../src/app/state.ts';
import { ownFilmFault } from '../../src/app/steps/OwnFilm.tsx';
import type { EstimateResult } from '../../src/engine/contract.ts';
import type { ThicknessMap } from '../../src/match/types.ts';

beforeEach(() => begin(DEFAULT_SETUP));

describe('changes of the set-up', () => {
  it('are undone and done again, one by one', () => {
    setReference('clean', [1, 2, 30, 40]);
    addPin([5, 6], { is: 'bare' });
    undo();
    expect(setup.value.pins).toBeUndefined();
    expect(setup.value.references?.clean).toEqual([1, 2, 30, 40]);
    undo();
    expect(setup.value).toEqual(DEFAULT_SETUP);
    expect(canUndo.value).toBe(false);
    redo();
    redo();
    expect(setup.value.pins).toEqual([{ at: [5, 6], is: 'bare' }]);
    expect(canRedo.value).toBe(false);
  });

  it('in one series are one thing to undo', () => {
    for (const daylightK of [6600, 6700, 6800]) change({ ...setup.value, light: { daylightK } }, 'sky');
    change({ ...setup.value, incidenceDeg: 5 }, 'incidence');
    undo();
    expect(setup.value.light).toEqual({ daylightK: 6800 });
    undo();
    expect(setup.value).toEqual(DEFAULT_SETUP);
  });

  it('after an undo begin a new series', () => {
    change({ ...setup.value, incidenceDeg: 5 }, 'incidence');
    undo();
    change({ ...setup.value, incidenceDeg: 9 }, 'incidence');
    undo();
    expect(setup.value).toEqual(DEFAULT_SETUP);
  });

  it('drop what was undone', () => {
    setRegion([
      [0, 0],
      [9, 0],
      [9, 9],
    ]);
    undo();
    change({ ...setup.value, film: 'diesel' });
    expect(canRedo.value).toBe(false);
  });

  it('remember a hundred, and no more', () => {
    for (let k = 1; k <= 150; k++) change({ ...setup.value, incidenceDeg: k / 10 });
    let undone = 0;
    while (canUndo.value) {
      undo();
      undone++;
    }
    expect(undone).toBe(100);
  });
});

describe('a reading', () => {
  const map: ThicknessMap = {
    width: 1,
    height: 1,
    thicknessNm: new Float32Array(1),
    lowNm: new Float32Array(1),
    highNm: new Float32Array(1),
    order: new Uint8Array(1),
    status: new Uint8Array(1),
  };
  const reading = { map, summary: {} } as EstimateResult;

  it('is put aside by a pin, is seen meanwhile, and comes back with an undo', () => {
    keepResult(reading, setup.value);
    expect(result.value).toBe(reading);
    addPin([5, 6], { is: 'bare' });
    expect(result.value).toBeNull();
    expect(preview.value).toBe(map);
    undo();
    expect(result.value).toBe(reading);
    expect(preview.value).toBeNull();
    redo();
    expect([result.value, preview.value]).toEqual([null, map]);
  });

  it('of another film or light is not even seen, yet an undo brings it back', () => {
    keepResult(reading, setup.value);
    change({ ...setup.value, film: 'diesel' });
    expect([result.value, preview.value]).toEqual([null, null]);
    undo();
    expect(result.value).toBe(reading);
  });

  it('that came too late for its marks is no result', () => {
    const asked = setup.value;
    addPin([5, 6], { is: 'bare' });
    keepResult(reading, asked);
    expect([result.value, preview.value]).toEqual([null, map]);
    begin(DEFAULT_SETUP);
    expect([result.value, preview.value]).toEqual([null, null]);
  });
});

describe('the chosen mark', () => {
  it('is the one just placed, and none once it is undone', () => {
    setReference('dark', [1, 2, 30, 40]);
    expect(selected.value).toEqual({ kind: 'dark' });
    undo();
    expect(selected.value).toBeNull();
  });

  it('is at first the reference that is there, else the kind that suits the film', () => {
    beginMarking();
    expect([marking.value, selected.value]).toEqual(['white', null]);
    begin({ ...DEFAULT_SETUP, film: 'diesel' });
    beginMarking();
    expect(marking.value).toBe('clean');
    begin({ ...DEFAULT_SETUP, references: { dark: [0, 0, 9, 9] } });
    beginMarking();
    expect([marking.value, selected.value]).toEqual(['dark', { kind: 'dark' }]);
  });
});

describe('films', () => {
  it('lie on water where they are oils', () => {
    expect(onWater('heavyCrude')).toBe(true);
    expect(onWater('bubbleMix')).toBe(false);
    expect(onWater('magnesiumFluorideOnGlass')).toBe(false);
  });

  it('of one’s own are refused with what to type', () => {
    expect(ownFilmFault(1.4, 55)).toBeNull();
    expect(ownFilmFault(0.9, 55)).toContain('between 1 and 5');
    expect(ownFilmFault(Number.NaN, 55)).toContain('between 1 and 5');
    expect(ownFilmFault(1.4, 0)).toContain('between 5 and 200');
  });
});
