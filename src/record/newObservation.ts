import type { Setup } from '../engine/setup.ts';
import type { PhotoMetadata } from '../photo/types.ts';
import { sunPosition } from '../view/sun.ts';
import { notKnown } from './notKnown.ts';
import {
  type Conditions,
  OBSERVATION_KIND,
  type Observation,
  type ObservedPosition,
  type ObservedTime,
  type RecordedResult,
  SCHEMA_VERSION,
  type Viewpoint,
  type ViewpointKind,
} from './observation.ts';

export interface NewObservation {
  readonly id: string;
  readonly nowUtc: string;
  readonly madeWith: Observation['madeWith'];
  readonly title: string;
  readonly from: ViewpointKind;
  /** What this observer said last time. */
  readonly observer?: Observation['observer'];
  readonly photo?: {
    readonly metadata: PhotoMetadata;
    readonly measuredWidth: number;
    readonly measuredHeight: number;
  };
  readonly setup?: Setup;
  readonly result?: RecordedResult;
  readonly conditions?: Conditions;
}

/** An observation with all that the photo, the set-up and the device know; its files come later. */
export function newObservation(given: NewObservation): Observation {
  const { id, nowUtc, madeWith, title, from, photo, setup } = given;
  const metadata = photo?.metadata;
  return finished({
    kind: OBSERVATION_KIND,
    schemaVersion: SCHEMA_VERSION,
    id,
    title,
    createdUtc: nowUtc,
    changedUtc: nowUtc,
    madeWith,
    observer: given.observer ?? {},
    time: metadata ? timeOf(metadata) : deviceTime(nowUtc),
    position: positionOf(setup, metadata),
    viewpoint: viewpointOf(from, setup, metadata),
    conditions: { ...(setup?.windMS !== undefined && { windMS: setup.windMS }), ...given.conditions },
    substance: null,
    slickByEye: null,
    lookAlikes: null,
    photo: photo ?? null,
    setup: setup ?? null,
    result: given.result ?? null,
    toldTo: [],
    remarks: '',
    notKnown: [],
    leftOut: [],
    files: [],
  });
}

/** The observation with what follows from its fields: where the sun stood, and the list of what is not known. */
export function finished(observation: Observation): Observation {
  const { sun: _, ...rest } = observation.conditions;
  const sun = sunOf(observation);
  const complete = { ...observation, conditions: sun ? { ...rest, sun } : rest };
  return { ...complete, notKnown: notKnown(complete) };
}

/** The photo's own time; null where it does not say. */
export function timeOf({ takenAt, takenAtHasOffset }: PhotoMetadata): ObservedTime | null {
  return takenAt ? observedTime(takenAt, 'exif', takenAtHasOffset ? 'exif' : null) : null;
}

/** The device's clock, which counts in UTC. */
export function deviceTime(utc: string): ObservedTime {
  return observedTime(utc, 'device', 'device');
}

/**
 * A time in ISO 8601, with Z or an offset where `offsetSource` says who gave one.
 * @throws RangeError where the text is no time
 */
export function observedTime(
  recorded: string,
  source: ObservedTime['source'],
  offsetSource: ObservedTime['offsetSource'],
): ObservedTime {
  const offset = /(Z|[+-]\d{2}:\d{2})$/.exec(recorded)?.[1] ?? null;
  const instant = Date.parse(offset ? recorded : `${recorded}Z`);
  if (!Number.isFinite(instant)) throw new RangeError(`${recorded} is no time like 2025-05-14T09:30.`);
  return {
    utc: offset ? new Date(instant).toISOString() : null,
    recorded,
    offset,
    source,
    offsetSource: offset ? offsetSource : null,
  };
}

function positionOf(setup?: Setup, metadata?: PhotoMetadata): ObservedPosition | null {
  const own = metadata?.position;
  const said = setup?.position;
  if (said && !(own && own.latitudeDeg === said.latitudeDeg && own.longitudeDeg === said.longitudeDeg)) {
    return { latitudeDeg: said.latitudeDeg, longitudeDeg: said.longitudeDeg, source: 'typed' };
  }
  if (!own) return null;
  const { latitudeDeg, longitudeDeg, errorM } = own;
  return { latitudeDeg, longitudeDeg, ...(errorM !== undefined && { errorM }), source: 'exif' };
}

/** Camera angles are the set-up's where it says them; a heading typed there is from true north. */
function viewpointOf(from: ViewpointKind, setup?: Setup, metadata?: PhotoMetadata): Viewpoint {
  const { view, headingDeg } = setup ?? {};
  const exifHeading = metadata?.headingDeg;
  const focal = view?.focal35mm ?? metadata?.focalLength35mm;
  return {
    from,
    ...(view?.heightM !== undefined && { heightM: { value: view.heightM, source: 'typed' } }),
    ...(headingDeg !== undefined
      ? {
          headingDeg: { value: headingDeg, source: headingDeg === exifHeading ? 'exif' : 'typed' },
          headingReference: 'true',
        }
      : exifHeading !== undefined && {
          headingDeg: { value: exifHeading, source: 'exif' },
          ...(metadata?.headingReference && { headingReference: metadata.headingReference }),
        }),
    ...(view?.pitchDeg !== undefined && { pitchDeg: { value: view.pitchDeg, source: 'typed' } }),
    ...(view?.rollDeg !== undefined && { rollDeg: { value: view.rollDeg, source: 'typed' } }),
    ...(focal !== undefined && {
      focalLength35mm: { value: focal, source: view?.focal35mm === undefined ? 'exif' : 'typed' },
    }),
  };
}

function sunOf({ time, position, viewpoint, leftOut }: Observation): Conditions['sun'] {
  if (!time?.utc || !position || viewpoint.from === 'bench' || leftOut.includes('position')) return undefined;
  const { elevationDeg, azimuthDeg } = sunPosition(
    Date.parse(time.utc),
    position.latitudeDeg,
    position.longitudeDeg,
  );
  return { value: { elevationDeg, azimuthDeg: ((azimuthDeg % 360) + 360) % 360 }, source: 'computed' };
}
