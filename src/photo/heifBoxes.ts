import { ascii, type ByteRange, u16be, u32be } from './bytes.ts';

/** One box of an ISO base media file (ISO/IEC 14496-12, 4.2): its four letters, and where its contents lie. */
export interface Box extends ByteRange {
  readonly type: string;
}

/** The boxes that follow one another in a range. `whole` is false where the last one runs past the end. */
export function listBoxes(bytes: Uint8Array, range: ByteRange): { boxes: Box[]; whole: boolean } {
  const boxes: Box[] = [];
  const end = range.offset + range.length;
  let at = range.offset;
  while (at + 8 <= end && boxes.length < 10_000) {
    let size = u32be(bytes, at);
    let header = 8;
    if (size === 1) {
      size = u32be(bytes, at + 8) * 2 ** 32 + u32be(bytes, at + 12);
      header = 16;
    } else if (size === 0) size = end - at;
    if (size < header) return { boxes, whole: false };
    boxes.push({ type: ascii(bytes, at + 4, 4), offset: at + header, length: size - header });
    at += size;
  }
  return { boxes, whole: at === end };
}

/** Children of a full box (version and flags in front). */
export const childrenOf = (bytes: Uint8Array, box: Box, skip: number): Box[] =>
  listBoxes(bytes, { offset: box.offset + skip, length: box.length - skip }).boxes;

/** Item id of the picture to show (`pitm`, ISO/IEC 14496-12, 8.11.4). */
export const primaryItem = (bytes: Uint8Array, box: Box): number =>
  bytes[box.offset] === 0 ? u16be(bytes, box.offset + 4) : u32be(bytes, box.offset + 4);

/** Id of the first item of a type (`iinf` and `infe`, 8.11.6). */
export function itemOfType(bytes: Uint8Array, box: Box, type: string): number | undefined {
  for (const entry of childrenOf(bytes, box, bytes[box.offset] === 0 ? 6 : 8)) {
    const version = bytes[entry.offset];
    const wide = version === 3;
    if (entry.type !== 'infe' || (version !== 2 && !wide)) continue;
    if (ascii(bytes, entry.offset + (wide ? 10 : 8), 4) === type)
      return wide ? u32be(bytes, entry.offset + 4) : u16be(bytes, entry.offset + 4);
  }
  return undefined;
}

/** Where each item's bytes lie in the file (`iloc`, 8.11.3); items kept inside `idat` are relative to it. */
export function itemExtents(bytes: Uint8Array, box: Box, idat: Box | undefined): Map<number, ByteRange[]> {
  const items = new Map<number, ByteRange[]>();
  const version = bytes[box.offset] ?? 0;
  const sizes = u16be(bytes, box.offset + 4);
  const [offsetSize, lengthSize, baseSize] = [sizes >> 12, (sizes >> 8) & 15, (sizes >> 4) & 15];
  const indexSize = version > 0 ? sizes & 15 : 0;
  const end = Math.min(box.offset + box.length, bytes.length);
  let at = box.offset + 6;
  const read = (size: number): number => {
    const value =
      size === 8
        ? u32be(bytes, at) * 2 ** 32 + u32be(bytes, at + 4)
        : size === 4
          ? u32be(bytes, at)
          : size === 2
            ? u16be(bytes, at)
            : 0;
    at += size;
    return value;
  };
  const count = read(version < 2 ? 2 : 4);
  for (let item = 0; item < count && at < end; item++) {
    const id = read(version < 2 ? 2 : 4);
    const inIdat = version > 0 && (read(2) & 15) === 1;
    at += 2;
    const base = read(baseSize) + (inIdat ? (idat?.offset ?? Number.NaN) : 0);
    const extents: ByteRange[] = [];
    const extentCount = read(2);
    for (let i = 0; i < extentCount && at < end; i++) {
      at += indexSize;
      const offset = base + read(offsetSize);
      extents.push({ offset, length: read(lengthSize) });
    }
    items.set(id, extents);
  }
  return items;
}

/** Properties of one item, in order (`ipco` and `ipma`, ISO/IEC 23008-12, 9.3). */
export function itemProperties(bytes: Uint8Array, ipma: Box, all: readonly Box[], item: number): Box[] {
  const version = bytes[ipma.offset] ?? 0;
  const wideIndex = ((bytes[ipma.offset + 3] ?? 0) & 1) === 1;
  const end = Math.min(ipma.offset + ipma.length, bytes.length);
  const count = u32be(bytes, ipma.offset + 4);
  let at = ipma.offset + 8;
  for (let entry = 0; entry < count && at < end; entry++) {
    const id = version < 1 ? u16be(bytes, at) : u32be(bytes, at);
    at += version < 1 ? 2 : 4;
    const associations = bytes[at++] ?? 0;
    const found: Box[] = [];
    for (let i = 0; i < associations; i++) {
      const index = wideIndex ? u16be(bytes, at) & 0x7fff : (bytes[at] ?? 0) & 0x7f;
      at += wideIndex ? 2 : 1;
      const property = all[index - 1];
      if (property) found.push(property);
    }
    if (id === item) return found;
  }
  return [];
}
