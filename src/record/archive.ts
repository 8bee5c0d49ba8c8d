/**
 * One ZIP that holds an observation whole: `observation.json`, its files as they were, what was exported from it, and
 * `SHA256SUMS.txt` over all of them in the form that `sha256sum -c` reads.
 */
import { strFromU8, strToU8, unzipSync } from 'fflate';
import type { Observation, RecordFiles, Sha256 } from './observation.ts';
import { parseObservation, RecordError, writeObservation } from './readObservation.ts';
import { writeZip, type ZipEntry } from './zip.ts';

export const OBSERVATION_PATH = 'observation.json';
export const CHECKSUMS_PATH = 'SHA256SUMS.txt';
/** What programs and people read beside the record; it can be made anew from it. */
export const EXPORTS_FOLDER = 'exports/';

export interface ArchiveContent {
  readonly observation: Observation;
  readonly files: RecordFiles;
}

export interface WriteArchiveOptions {
  readonly sha256: Sha256;
  /** By name, without the folder: "report.html", "results.csv". */
  readonly exports?: ReadonlyMap<string, Uint8Array | string>;
  readonly pause?: () => Promise<void>;
}

/**
 * The ZIP in pieces for a Blob.
 * @throws RecordError where a file of the observation is missing or is not the one that was recorded
 */
export async function writeArchive(
  { observation, files }: ArchiveContent,
  { sha256, exports, pause }: WriteArchiveOptions,
): Promise<Uint8Array[]> {
  const entries: ZipEntry[] = [{ path: OBSERVATION_PATH, bytes: strToU8(writeObservation(observation)) }];
  for (const { path } of observation.files) {
    const bytes = files.get(path);
    if (!bytes)
      throw new RecordError(`"${path}" of this observation is missing: save the observation again.`);
    entries.push({ path, bytes });
  }
  for (const [name, content] of exports ?? []) {
    const bytes = typeof content === 'string' ? strToU8(content) : content;
    entries.push({ path: `${EXPORTS_FOLDER}${name}`, bytes });
  }
  const sums: string[] = [];
  for (const { path, bytes } of entries) {
    const hash = await sha256(bytes);
    const recorded = observation.files.find((file) => file.path === path)?.sha256;
    if (recorded !== undefined && recorded !== hash) {
      throw new RecordError(
        `"${path}" is no longer what was recorded: import the last exported ZIP instead.`,
      );
    }
    sums.push(`${hash}  ${path}\n`);
  }
  entries.push({ path: CHECKSUMS_PATH, bytes: strToU8(sums.join('')) });
  const modified = observation.changedUtc;
  return writeZip(entries, { modified, ...(pause && { pause }) });
}

/** No observation needs more: a larger one is no observation. */
const LARGEST_JSON = 50e6;
const NOT_OURS = 'There is no observation in this file: choose a ZIP that Tintfathom exported.';
const DAMAGED = 'This ZIP is damaged or was not copied to its end: copy it again from where it was exported.';

/**
 * The observation and its files, byte for byte as they were exported. Every file is held against its SHA-256.
 * @throws RecordError with a sentence that says what to do; nothing is half imported
 */
export async function readArchive(zip: Uint8Array, sha256: Sha256): Promise<ArchiveContent> {
  const json = unpack(zip, (path, size) => path === OBSERVATION_PATH && size <= LARGEST_JSON)[
    OBSERVATION_PATH
  ];
  if (!json) throw new RecordError(NOT_OURS);
  const observation = parseObservation(strFromU8(json));
  const listed = new Map(observation.files.map((file) => [file.path, file]));
  // Only what is listed, and only at its listed size: nothing else is worth the memory.
  const found = unpack(zip, (path, size) => listed.get(path)?.byteLength === size || path === CHECKSUMS_PATH);
  await mustMatch(OBSERVATION_PATH, json, sumOf(found[CHECKSUMS_PATH], OBSERVATION_PATH), sha256);
  const files = new Map<string, Uint8Array>();
  for (const { path, sha256: recorded } of observation.files) {
    const bytes = found[path];
    if (!bytes) {
      throw new RecordError(`"${path}" is missing in this ZIP or was changed: import another copy of it.`);
    }
    await mustMatch(path, bytes, recorded, sha256);
    files.set(path, bytes);
  }
  return { observation, files };
}

function unpack(zip: Uint8Array, wants: (path: string, size: number) => boolean): Record<string, Uint8Array> {
  try {
    return unzipSync(zip, { filter: ({ name, originalSize }) => wants(name, originalSize) });
  } catch (cause) {
    // A ZIP begins with its first entry's mark; what does not is some other file.
    const isZip = zip[0] === 0x50 && zip[1] === 0x4b;
    throw new RecordError(isZip ? DAMAGED : NOT_OURS, { cause });
  }
}

/** The listed hash of a path; null where the list is missing or does not name it. */
function sumOf(list: Uint8Array | undefined, path: string): string | null {
  if (!list) return null;
  const line = strFromU8(list)
    .split('\n')
    .find((text) => text.slice(66) === path);
  return line?.slice(0, 64) ?? null;
}

async function mustMatch(
  path: string,
  bytes: Uint8Array,
  recorded: string | null,
  sha256: Sha256,
): Promise<void> {
  if (recorded !== (await sha256(bytes))) {
    throw new RecordError(
      `"${path}" in this ZIP does not match its SHA-256: it was changed or damaged. Nothing was imported; take another copy.`,
    );
  }
}
