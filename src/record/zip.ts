import { Zip, ZipDeflate, ZipPassThrough } from 'fflate';

export interface ZipEntry {
  readonly path: string;
  readonly bytes: Uint8Array;
}

export interface ZipOptions {
  /** ISO 8601; its digits stand as the time of every file, for ZIP knows no time zone. */
  readonly modified: string;
  /** Awaited after every two megabytes, so that a page stays alive; nothing where absent. */
  readonly pause?: () => Promise<void>;
}

const PIECE = 2 << 20;
/** Already packed (our TIFFs are deflated inside): packing again takes time and saves nothing. */
const PACKED = /\.(jpe?g|png|webp|avif|hei[cf]|tiff?|zip)$/i;
const LEVEL = 3;

/**
 * A ZIP file in pieces (give them to a Blob). The same entries and time give the same bytes.
 * @throws Error where the time is none
 */
export async function writeZip(entries: readonly ZipEntry[], options: ZipOptions): Promise<Uint8Array[]> {
  const modified = dosTime(options.modified);
  const pieces: Uint8Array[] = [];
  let failure: Error | null = null;
  const zip = new Zip((error, piece) => {
    if (error) failure = error;
    else pieces.push(piece);
  });
  for (const { path, bytes } of entries) {
    const file = PACKED.test(path) ? new ZipPassThrough(path) : new ZipDeflate(path, { level: LEVEL });
    file.mtime = modified;
    zip.add(file);
    for (let from = 0; ; from += PIECE) {
      const isLast = from + PIECE >= bytes.length;
      // A copy: fflate may keep the piece, and a view would keep all of the file's memory.
      file.push(bytes.slice(from, from + PIECE), isLast);
      if (isLast) break;
      await options.pause?.();
    }
  }
  zip.end();
  if (failure) throw failure;
  return pieces;
}

/** fflate writes the local reading of a Date: made so that this is the digits of the text, anywhere. */
function dosTime(iso: string): Date {
  const parts = /^(\d{4})-(\d{2})-(\d{2})T(\d{2}):(\d{2}):(\d{2})/.exec(iso);
  if (!parts) throw new RangeError(`${iso} is not a time like 2025-05-14T09:30:00Z.`);
  const [year, month, day, hour, minute, second] = parts.slice(1).map(Number) as [
    number,
    number,
    number,
    number,
    number,
    number,
  ];
  // ZIP counts years from 1980.
  return new Date(Math.max(1980, year), month - 1, day, hour, minute, second);
}
