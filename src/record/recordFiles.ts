import type { ThicknessMap } from '../match/types.ts';
import { encodeByteTiff, encodeFloatTiff } from './floatTiff.ts';
import type { FileRole, RecordedFile, RecordFiles, Sha256 } from './observation.ts';
import { RecordError } from './readObservation.ts';
import { readTiff } from './readTiff.ts';

export interface RecordedParts {
  /** The photo as it was opened: bytes that are never re-encoded. */
  readonly original?: { readonly fileName: string; readonly mediaType: string; readonly bytes: Uint8Array };
  readonly map?: ThicknessMap;
  /** Ready files of the other roles: a map picture, outlines, a ground map, a profile. */
  readonly more?: readonly {
    readonly path: string;
    readonly role: FileRole;
    readonly mediaType: string;
    readonly bytes: Uint8Array;
  }[];
}

const MAP_FILES = {
  thicknessNm: 'results/thickness_nm.tif',
  lowNm: 'results/low_nm.tif',
  highNm: 'results/high_nm.tif',
  order: 'results/order.tif',
  status: 'results/status.tif',
} as const;

/**
 * The files of an observation with their hashes, ready for its `files` and for the store. Maps become deflated TIFFs, which
 * takes about a second for 12 million pixels and layer: do it in a worker where the map is large.
 */
export async function recordFiles(
  { original, map, more = [] }: RecordedParts,
  sha256: Sha256,
): Promise<{ readonly listed: readonly RecordedFile[]; readonly files: RecordFiles }> {
  const listed: RecordedFile[] = [];
  const files = new Map<string, Uint8Array>();
  const add = async (path: string, role: FileRole, mediaType: string, bytes: Uint8Array) => {
    files.set(path, bytes);
    listed.push({ path, role, mediaType, byteLength: bytes.length, sha256: await sha256(bytes) });
  };
  if (original) {
    await add(`original/${safeName(original.fileName)}`, 'original', original.mediaType, original.bytes);
  }
  if (map) {
    const { width, height } = map;
    const compression = 'deflate';
    for (const role of ['thicknessNm', 'lowNm', 'highNm'] as const) {
      const bytes = encodeFloatTiff({ width, height, values: map[role], compression });
      await add(MAP_FILES[role], role, 'image/tiff', bytes);
    }
    for (const role of ['order', 'status'] as const) {
      const bytes = encodeByteTiff({ width, height, values: map[role], compression });
      await add(MAP_FILES[role], role, 'image/tiff', bytes);
    }
  }
  for (const { path, role, mediaType, bytes } of more) await add(path, role, mediaType, bytes);
  return { listed, files };
}

/**
 * The map that an observation's files hold, bit for bit; null where it has none.
 * @throws RecordError, RasterError where a layer is missing, damaged or of another size
 */
export function mapOf(listed: readonly RecordedFile[], files: RecordFiles): ThicknessMap | null {
  const layer = (role: FileRole) => {
    const bytes = files.get(listed.find((file) => file.role === role)?.path ?? '');
    return bytes ? readTiff(bytes) : null;
  };
  const thickness = layer('thicknessNm');
  if (!thickness) return null;
  const { width, height } = thickness;
  const floats = (role: FileRole): Float32Array => {
    const read = role === 'thicknessNm' ? thickness : layer(role);
    if (read?.width !== width || read.height !== height || !(read.values instanceof Float32Array)) {
      throw new RecordError(`The map of this observation lacks its layer "${role}": import its ZIP again.`);
    }
    return read.values;
  };
  const bytes = (role: FileRole): Uint8Array => {
    const read = layer(role);
    if (read?.width !== width || read.height !== height || !(read.values instanceof Uint8Array)) {
      throw new RecordError(`The map of this observation lacks its layer "${role}": import its ZIP again.`);
    }
    return read.values;
  };
  return {
    width,
    height,
    thicknessNm: floats('thicknessNm'),
    lowNm: floats('lowNm'),
    highNm: floats('highNm'),
    order: bytes('order'),
    status: bytes('status'),
  };
}

/** The name without folders and without what archives and listings cannot hold; "photo" where nothing is left. */
export function safeName(fileName: string): string {
  const name = fileName
    .replace(/^.*[\\/]/, '')
    .replace(/\p{Cc}/gu, '')
    .trim();
  return /^\.*$/.test(name) ? 'photo' : name;
}
