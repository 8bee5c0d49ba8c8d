import type * as v from 'valibot';
import { describe, expect, test } from 'vitest';
import { notKnown } from '../../src/record/notKnown.ts';
import type { Observation } from '../../src/record/observation.ts';
import type { observationSchema } from '../../src/record/observationSchema.ts';
import {
  MIGRATIONS,
  migrate,
  parseObservation,
  RecordError,
  readObservation,
  writeObservation,
} from '../../src/record/readObservation.ts';
import { recordResult } from '../../src/record/recordResult.ts';
import { notebookObservation, quayObservation } from './sample.ts';

// The schema and the interface say the same, in all but the two parts that the schema leaves loose. Proven by the compiler.
type Loose = 'photo' | 'setup';
const schemaConforms: (
  read: Omit<v.InferOutput<typeof observationSchema>, Loose>,
) => Omit<Observation, Loose> = (read) => read;

test('an observation comes back from its text, and its text from it, byte for byte', () => {
  for (const observation of [quayObservation(), notebookObservation()]) {
    const text = writeObservation(observation);
    const back = parseObservation(text);
    expect(back).toEqual(observation);
    expect(writeObservation(back)).toBe(text);
    expect(schemaConforms(back as never)).toBe(back);
  }
});

test('keys in another order stay in that order', () => {
  const turned = Object.fromEntries(Object.entries(quayObservation()).reverse());
  const text = writeObservation(turned as unknown as Observation);
  expect(writeObservation(parseObservation(text))).toBe(text);
});

test('a number that JSON cannot hold is refused, not turned into null', () => {
  const bad = {
    ...quayObservation(),
    viewpoint: { from: 'shore', heightM: { value: Number.NaN, source: 'typed' } },
  };
  expect(() => writeObservation(bad as Observation)).toThrow('no number at "value"');
});

test('results without oil are kept with null where there is no number', () => {
  const { area, byThickness } = recordResult({
    area: {
      regionM2: 0,
      oiledM2: 0,
      bareM2: 0,
      unreadM2: 0,
      atLeastM2: 0,
      ambiguousM2: 0,
      excludedPixels: 3,
      coverage: Number.NaN,
      coverageLeast: Number.NaN,
      coverageMost: Number.NaN,
      histogram: { stepNm: 10, areaM2: new Float64Array(2) },
    },
    byThickness: { ...quayObservation().result!.byThickness!, meanThicknessNm: Number.NaN },
  });
  expect(area).not.toHaveProperty('histogram');
  expect([area?.coverage, area?.coverageLeast, area?.coverageMost, byThickness?.meanThicknessNm]).toEqual([
    null,
    null,
    null,
    null,
  ]);
});

describe('what is not right is named', () => {
  /** The sample with one place changed, or taken away where the value is undefined. */
  function spoilt(path: string, value: unknown): unknown {
    const sample: unknown = JSON.parse(writeObservation(quayObservation()));
    const keys = path.split('.');
    const last = keys.pop()!;
    const holder = keys.reduce<unknown>((at, key) => (at as Record<string, unknown>)[key], sample);
    Object.assign(holder as object, { [last]: value });
    return JSON.parse(JSON.stringify(sample));
  }

  test.each([
    ['a latitude off the globe', 'position.latitudeDeg', 95],
    ['an unknown key', 'viewpoint.heigth', 3],
    ['a time that is not UTC', 'createdUtc', '2025-05-14 11:40'],
    ['a hash of the wrong length', 'files.0.sha256', 'ab'],
    ['a path out of the archive', 'files.0.path', 'a/../../b'],
    ['a share above 1', 'result.area.coverage', 1.2],
    ['a missing field', 'remarks', undefined],
  ])('%s', (_, place, value) => {
    const bad = spoilt(place, value);
    expect(() => readObservation(bad)).toThrow(RecordError);
    expect(() => readObservation(bad)).toThrow(`"${place}"`);
  });

  test.each([null, 3, 'x', [], {}, { kind: 'other' }])('%j is no observation', (value) => {
    expect(() => readObservation(value)).toThrow('not an observation of Tintfathom');
  });

  test('text that is not JSON', () => {
    expect(() => parseObservation('{"kind":')).toThrow('damaged');
  });
});

describe('migrations', () => {
  const at = (schemaVersion: unknown) => ({ kind: 'tintfathom/observation', schemaVersion, speedKn: 10 });
  const steps = {
    1: ({ speedKn, ...rest }: Record<string, unknown>) => ({ ...rest, speedMS: (speedKn as number) * 0.5 }),
    2: (older: Record<string, unknown>) => ({ ...older, note: '' }),
  };

  test('steps are applied in turn, each once, and the version goes along', () => {
    expect(migrate(at(1), steps, 3)).toEqual({
      kind: 'tintfathom/observation',
      schemaVersion: 3,
      speedMS: 5,
      note: '',
    });
    expect(migrate({ ...at(2) }, steps, 3)).toMatchObject({ schemaVersion: 3, note: '', speedKn: 10 });
  });

  test('a newer one asks for an update of the app', () => {
    expect(() => migrate(at(4), steps, 3)).toThrow('update the app');
  });

  test('without a step, or a version, it says so', () => {
    expect(() => migrate(at(1), {}, 3)).toThrow('version 1 can no longer be read');
    for (const none of [undefined, 0, 1.5, '1'])
      expect(() => migrate(at(none), steps, 3)).toThrow('does not say its version');
  });

  test('every version before the present one has its step', () => {
    const { schemaVersion } = quayObservation();
    expect(Object.keys(MIGRATIONS).map(Number)).toEqual(
      Array.from({ length: schemaVersion - 1 }, (_, i) => i + 1),
    );
  });
});

describe('what was not known', () => {
  test('a full record lacks only what was left open', () => {
    expect(notKnown(quayObservation())).toEqual(['Who has been told.']);
  });

  test('a notebook lacks most, and asks nothing about a photo that is not there', () => {
    const list = notKnown(notebookObservation());
    expect(list).toContain('The position.');
    expect(list).toContain('The speed of the wind.');
    expect(list.join(' ')).not.toContain('camera took');
    expect(new Set(list).size).toBe(list.length);
  });

  test('a clock without an offset is not UTC', () => {
    const time = {
      utc: null,
      recorded: '2025-05-14T10:32:07',
      offset: null,
      source: 'exif',
      offsetSource: null,
    } as const;
    expect(notKnown({ ...quayObservation(), time })[0]).toBe(
      'The time in UTC: the clock said 2025-05-14T10:32:07 without an offset.',
    );
  });

  test('a bench is not asked for the sea', () => {
    const list = notKnown({ ...notebookObservation(), viewpoint: { from: 'bench' } });
    expect(list.join(' ')).not.toMatch(/sea|wind|water|oil/);
  });
});
