import { expect, test } from 'vitest';
import { finished, newObservation, observedTime } from '../../src/engine/newObservation.ts';
import { readObservation } from '../../src/record/readObservation.ts';
import { PLACE, quayObservation } from '../record/sample.ts';

const sample = quayObservation();
const metadata = sample.photo!.metadata;
const given = {
  id: 'one',
  nowUtc: '2025-06-01T08:00:00.000Z',
  madeWith: { app: '1', model: '1' },
  title: 'Diesel, quay',
  from: 'shore',
  photo: { metadata, measuredWidth: 1200, measuredHeight: 1600 },
  setup: sample.setup!,
  result: sample.result!,
} as const;

test('time, position, heading and lens come from the photo; the sun follows', () => {
  const observation = newObservation(given);
  expect(observation.time).toMatchObject({
    utc: '2025-05-14T11:32:07.000Z',
    offset: '-01:00',
    source: 'exif',
  });
  expect(observation.position).toMatchObject({ ...PLACE, source: 'exif' });
  expect(observation.viewpoint).toMatchObject({
    headingDeg: { value: 214.5, source: 'exif' },
    headingReference: 'true',
    focalLength35mm: { value: 26, source: 'exif' },
  });
  // 11:32 UTC at 21.4 W is 10:06 by the sun: it stands in the south east, high in May.
  const sun = observation.conditions.sun!.value;
  expect(sun.azimuthDeg).toBeGreaterThan(120);
  expect(sun.azimuthDeg).toBeLessThan(145);
  expect(sun.elevationDeg).toBeGreaterThan(50);
  expect(readObservation(observation)).toBe(observation);
});

test('a clock without an offset is not passed off as UTC, and is listed as not known', () => {
  const { takenAt: _, ...rest } = metadata;
  const observation = newObservation({
    ...given,
    photo: {
      ...given.photo,
      metadata: { ...rest, takenAt: '2025-05-14T10:32:07', takenAtHasOffset: false },
    },
  });
  expect(observation.time).toMatchObject({ utc: null, recorded: '2025-05-14T10:32:07', offset: null });
  expect(observation.conditions.sun).toBeUndefined();
  expect(observation.notKnown.join(' ')).toContain('The time in UTC');
  const known = finished({
    ...observation,
    time: observedTime('2025-05-14T10:32:07+02:00', 'exif', 'typed'),
  });
  expect(known.time?.utc).toBe('2025-05-14T08:32:07.000Z');
  expect(known.conditions.sun).toBeDefined();
  expect(known.notKnown.join(' ')).not.toContain('The time in UTC');
});

test('the view of the set-up gives height and angles: typed, or worked out', () => {
  const typed = newObservation({
    ...given,
    setup: {
      ...given.setup,
      view: { heightM: 3, pitchDeg: -40, rollDeg: 1 },
      position: { latitudeDeg: 1, longitudeDeg: 2 },
    },
  });
  expect(typed.viewpoint).toMatchObject({
    heightM: { value: 3, source: 'typed' },
    pitchDeg: { value: -40, source: 'typed' },
  });
  expect(typed.position).toEqual({ latitudeDeg: 1, longitudeDeg: 2, source: 'typed' });
  // A level horizon a quarter above the middle: tan(pitch) is 400 px over the focal length of 26/43.27 x 2000 px.
  const seen = newObservation({
    ...given,
    setup: {
      ...given.setup,
      view: {
        heightM: 3,
        horizon: [
          [0, 400],
          [1200, 400],
        ],
      },
    },
  });
  const pitch = (-Math.atan(400 / ((26 / Math.hypot(36, 24)) * 2000)) * 180) / Math.PI;
  expect(seen.viewpoint.pitchDeg!.source).toBe('photo');
  // The horizon dips by 0.05 degrees from 3 m.
  expect(Math.abs(seen.viewpoint.pitchDeg!.value - pitch)).toBeLessThan(0.1);
  const half = newObservation({ ...given, setup: { ...given.setup, view: { heightM: 3 } } });
  expect(half.viewpoint.heightM).toEqual({ value: 3, source: 'typed' });
  expect(half.viewpoint.pitchDeg).toBeUndefined();
});

test('without a photo the time is the device’s, and nothing of a camera is asked for', () => {
  const { photo: _, setup: __, ...rest } = given;
  const observation = newObservation({ ...rest, from: 'aircraft' });
  expect(observation.time).toMatchObject({ utc: '2025-06-01T08:00:00.000Z', source: 'device' });
  expect(observation.notKnown.join(' ')).not.toMatch(/camera|lens|set-up|photo/);
  expect(observation.notKnown).toContain('The position.');
});
