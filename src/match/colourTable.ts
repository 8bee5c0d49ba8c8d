import { MODE_FIELDS, type Modes, makeModes } from './posterior.ts';

/**
 * Every colour met so far with its modes: a photo of millions of pixels holds a few hundred thousand colours at most,
 * and each needs its posterior once. Exact: a colour's answer is that of `read`.
 *
 * Record at `offset`: [mode count, squared distance from the chart, then MODE_FIELDS a mode].
 */
export interface ColourTable {
  /** Offset into `records` for code triple (r, g, b), integers below `levels`. */
  readonly lookUp: (r: number, g: number, b: number) => number;
  /** The record store; grows, so read it anew after a `lookUp`. */
  readonly records: () => Float32Array;
  readonly colours: () => number;
}

/**
 * @param levels codes a channel, 256 or 1024
 * @param read posterior of a colour on the 0..255 scale
 * @param room slots at first, a power of two; twice the colours expected
 */
export function makeColourTable(
  levels: number,
  read: (r: number, g: number, b: number, out: Modes) => void,
  room = 1 << 16,
): ColourTable {
  const bits = Math.ceil(Math.log2(levels));
  const scale = 255 / (levels - 1);
  let capacity = room;
  let keys = new Int32Array(capacity).fill(-1);
  let places = new Int32Array(capacity);
  let used = 0;
  let records = new Float32Array(4 * room);
  let end = 0;
  const modes = makeModes();

  function slotOf(key: number, mask: number): number {
    let slot = (Math.imul(key, 0x9e3779b1) >>> 7) & mask;
    while (keys[slot] !== key && keys[slot] !== -1) slot = (slot + 1) & mask;
    return slot;
  }

  function grow(): void {
    const oldKeys = keys;
    const oldPlaces = places;
    capacity *= 2;
    keys = new Int32Array(capacity).fill(-1);
    places = new Int32Array(capacity);
    for (let i = 0; i < oldKeys.length; i++) {
      if (oldKeys[i] === -1) continue;
      const slot = slotOf(oldKeys[i]!, capacity - 1);
      keys[slot] = oldKeys[i]!;
      places[slot] = oldPlaces[i]!;
    }
  }

  function lookUp(r: number, g: number, b: number): number {
    const key = (((r << bits) | g) << bits) | b;
    const slot = slotOf(key, capacity - 1);
    if (keys[slot] === key) return places[slot]!;
    read(r * scale, g * scale, b * scale, modes);
    const size = 2 + modes.count * MODE_FIELDS;
    if (end + size > records.length) {
      const larger = new Float32Array(records.length * 2);
      larger.set(records);
      records = larger;
    }
    const offset = end;
    records[end] = modes.count;
    records[end + 1] = modes.distance;
    for (let k = 0; k < modes.count * MODE_FIELDS; k++) records[end + 2 + k] = modes.values[k]!;
    end += size;
    keys[slot] = key;
    places[slot] = offset;
    used++;
    if (used * 2 > capacity) grow();
    return offset;
  }

  return { lookUp, records: () => records, colours: () => used };
}
