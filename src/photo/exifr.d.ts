/**
 * Only what we use of exifr's smallest build (JPEG, EXIF directories, no tag names). Declared here because the package
 * types its main build alone, and those types pull Node's globals into the folders that must stay pure.
 */
declare module 'exifr/dist/mini.esm.mjs' {
  export type TagValue = string | number | number[] | Uint8Array | Uint16Array | Uint32Array;
  export type Directory = Record<number, TagValue | undefined>;
  interface Output {
    ifd0?: Directory;
    exif?: Directory;
    gps?: Directory;
    interop?: Directory;
    errors?: unknown[];
  }
  export function parse(data: Uint8Array, options: Record<string, boolean>): Promise<Output | undefined>;
}
