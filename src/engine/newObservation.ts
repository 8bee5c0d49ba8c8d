import type { PhotoMetadata } from '../photo/types.ts';
import { notKnown } from '../record/notKnown.ts';
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
} from '../record/observation.ts';
import { sunPosition } from '../view/sun.ts';
import { withWholeView } from './partialView.ts';
import { photoViewOf, withPhotoFocal } from './photoView.ts';
import type { Setup } from './setup.ts';

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
  const { id, nowUtc, madeWith, title, photo, setup } = given;
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
    viewpoint: viewpointOf(given),
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

/** Height, angles and lens as the areas were worked out with; a heading typed in the set-up is from true north. */
function viewpointOf({ from, setup, photo }: NewObservation): Viewpoint {
  const { view, headingDeg } = setup ?? {};
  const metadata = photo?.metadata;
  const exifHeading = metadata?.headingDeg;
  const focal = view?.focal35mm ?? metadata?.focalLength35mm;
  return {
    from,
    ...poseOf(setup, photo),
    ...(headingDeg !== undefined
      ? {
          headingDeg: { value: headingDeg, source: headingDeg === exifHeading ? 'exif' : 'typed' },
          headingReference: 'true',
        }
      : exifHeading !== undefined && {
          headingDeg: { value: exifHeading, source: 'exif' },
          ...(metadata?.headingReference && { headingReference: metadata.headingReference }),
        }),
    ...(focal !== undefined && {
      focalLength35mm: { value: focal, source: view?.focal35mm === undefined ? 'exif' : 'typed' },
    }),
  };
}

/** The camera's height and tilt: typed, or from horizon and known length; only the height while the view is half told. */
function poseOf(
  setup: Setup | undefined,
  photo: NewObservation['photo'],
): Pick<Viewpoint, 'heightM' | 'pitchDeg' | 'rollDeg'> {
  const view = setup?.view;
  if (!setup || !view) return {};
  const seen = photo && seenThrough(setup, photo);
  if (!seen) return view.heightM === undefined ? {} : { heightM: { value: view.heightM, source: 'typed' } };
  const typedHeight = view.heightM !== undefined && !view.knownLength?.sets && view.pixelSizeM === undefined;
  const tilt = view.horizon ? 'photo' : 'typed';
  return {
    heightM: typedHeight
      ? { value: view.heightM, source: 'typed' }
      : { value: rounded(seen.heightM), source: 'computed' },
    pitchDeg: { value: rounded((seen.pitchRad * 180) / Math.PI), source: tilt },
    rollDeg: { value: rounded((seen.rollRad * 180) / Math.PI), source: tilt },
  };
}

function seenThrough(
  setup: Setup,
  { metadata, measuredWidth, measuredHeight }: NonNullable<NewObservation['photo']>,
) {
  const lens = { width: measuredWidth, height: measuredHeight, focalLength35mm: metadata.focalLength35mm };
  try {
    const whole = withPhotoFocal(withWholeView(setup, lens), metadata);
    return photoViewOf(whole, measuredWidth, measuredHeight)?.view ?? null;
  } catch {
    // A view that contradicts itself is said where it is told; here it only gives no angles.
    return null;
  }
}

/** Four digits: more than any of this is known to. */
function rounded(value: number): number {
  return Number(value.toPrecision(4));
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
