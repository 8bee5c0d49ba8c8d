/** Reads of untrusted bytes: past the end they give 0 or '', never a throw, so parsers check lengths once. */

/** Where a run of bytes lies in a file. */
export interface ByteRange {
  readonly offset: number;
  readonly length: number;
}

export const u16be = (bytes: Uint8Array, at: number): number =>
  ((bytes[at] ?? 0) << 8) | (bytes[at + 1] ?? 0);
export const u16le = (bytes: Uint8Array, at: number): number =>
  (bytes[at] ?? 0) | ((bytes[at + 1] ?? 0) << 8);
export const u32be = (bytes: Uint8Array, at: number): number =>
  u16be(bytes, at) * 65536 + u16be(bytes, at + 2);
export const u32le = (bytes: Uint8Array, at: number): number =>
  u16le(bytes, at) + u16le(bytes, at + 2) * 65536;
/** ICC s15Fixed16Number. */
export const s15Fixed16 = (bytes: Uint8Array, at: number): number => (u32be(bytes, at) | 0) / 65536;

/** Bytes as Latin-1 characters. */
export function ascii(bytes: Uint8Array, at: number, length: number): string {
  let text = '';
  for (let i = at; i < Math.min(at + length, bytes.length); i++) text += String.fromCharCode(bytes[i]!);
  return text;
}

/** A view (no copy) of a range, clipped to the file. */
export function slice(bytes: Uint8Array, { offset, length }: ByteRange): Uint8Array {
  return bytes.subarray(Math.min(offset, bytes.length), Math.min(offset + length, bytes.length));
}
