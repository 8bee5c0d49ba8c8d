/** Leaves the position out, everywhere it can be found again. */
import { strFromU8, strToU8 } from 'fflate';
import type { ArchiveContent } from './archive.ts';
import { encodeFloatTiff } from './floatTiff.ts';
import { notKnown } from './notKnown.ts';
import type { FileRole, Observation, RecordedFile, Sha256 } from './observation.ts';
import { readTiff } from './readTiff.ts';

export interface Redacted extends ArchiveContent {
  /** What the user must know or look at before handing it over. */
  readonly notices: readonly string[];
}

export interface RedactOptions {
  /** Keep the original photo although its EXIF data may hold the position. It is never edited: that would end its worth as evidence. */
  readonly keepOriginal: boolean;
  readonly sha256: Sha256;
}

/**
 * The observation without its position. Taken out: the position itself, the name of the place, the photo's own position and
 * altitude, the set-up's, the sun's place in the sky (with the time it would give the position back), the outlines' and the
 * ground map's coordinates, and the original photo unless it is to be kept. Titles, remarks and file names are the
 * user's words; they stay, and a notice says so.
 */
export async function withoutPosition(
  { observation, files }: ArchiveContent,
  { keepOriginal, sha256 }: RedactOptions,
): Promise<Redacted> {
  const keptFiles = new Map<string, Uint8Array>();
  const listed: RecordedFile[] = [];
  for (const file of observation.files) {
    const bytes = files.get(file.path);
    if (!bytes || (file.role === 'original' && !keepOriginal)) continue;
    const change = WITHOUT_PLACE[file.role];
    if (change) {
      const changed = change(bytes);
      keptFiles.set(file.path, changed);
      listed.push({ ...file, byteLength: changed.length, sha256: await sha256(changed) });
    } else {
      keptFiles.set(file.path, bytes);
      listed.push(file);
    }
  }
  const hadOriginal = observation.files.some(({ role }) => role === 'original');
  const leavesOriginal = hadOriginal && !keepOriginal;
  const { placeName: _, ...rest } = observation;
  const { sun: __, ...conditions } = observation.conditions;
  const changed: Observation = {
    ...rest,
    position: null,
    conditions,
    photo: observation.photo && { ...observation.photo, metadata: placeless(observation.photo.metadata) },
    setup: observation.setup && placeless(observation.setup),
    leftOut: [
      ...new Set([...observation.leftOut, 'position', ...(leavesOriginal ? ['original'] : [])] as const),
    ] as Observation['leftOut'],
    files: listed,
  };
  return {
    observation: { ...changed, notKnown: notKnown(changed) },
    files: keptFiles,
    notices: noticesFor(observation, hadOriginal, leavesOriginal),
  };
}

/** Files that hold coordinates, and how they do without. Thumbnails and map pictures are made without metadata. */
const WITHOUT_PLACE: Readonly<Partial<Record<FileRole, (bytes: Uint8Array) => Uint8Array>>> = {
  outlines: (bytes) => strToU8(withoutGeometry(strFromU8(bytes))),
  groundThicknessNm: (bytes) => {
    const { width, height, values, ground } = readTiff(bytes);
    // Its corner is counted from the camera: without the camera's place it is only a local grid.
    const geo = ground && { geo: { system: { kind: 'local' }, ...ground } as const };
    return encodeFloatTiff({
      width,
      height,
      values: Float32Array.from(values),
      compression: 'deflate',
      ...geo,
    });
  },
};

/** The features with their properties and null geometries (RFC 7946, section 3.2). */
export function withoutGeometry(geojson: string): string {
  const collection = JSON.parse(geojson) as { features: object[] };
  const features = collection.features.map((feature) => ({ ...feature, geometry: null }));
  return `${JSON.stringify({ ...collection, features })}\n`;
}

/** A set-up or metadata without position and altitude. */
export function placeless<T extends object>(holder: T): T {
  const copy = { ...holder } as T & { position?: unknown; altitudeM?: unknown };
  delete copy.position;
  delete copy.altitudeM;
  return copy;
}

function noticesFor(observation: Observation, hadOriginal: boolean, leavesOriginal: boolean): string[] {
  const notices: string[] = [];
  if (leavesOriginal) {
    notices.push(
      'The original photo is left out, because its own data may hold the position; its SHA-256 stays in the record.',
    );
  } else if (hadOriginal && observation.photo?.metadata.position) {
    notices.push('The original photo is included and holds the position in its own data.');
  } else if (hadOriginal) {
    notices.push('The original photo is included: what it shows may tell the place.');
  }
  notices.push('Read the title, the remarks and the file names: they are your words and may name the place.');
  return notices;
}
