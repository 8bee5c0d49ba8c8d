import type { Point, Rectangle, Setup } from '../../engine/setup.ts';
import { isViewMark, type ViewMark, viewEnds, withoutViewMark, withViewEnds } from './viewMarks.ts';
import { type Size, toScreen, type View } from './viewTransform.ts';

/** A mark on the photo that can be taken hold of. */
export type MarkId =
  | { readonly kind: 'clean' | 'white' | 'dark' }
  | { readonly kind: 'pin' | 'corner'; readonly index: number }
  | ViewMark;

/** Where a mark is held: its body, or one corner of a rectangle (-1 left or top, 1 right or bottom). */
export interface Grip {
  readonly mark: MarkId;
  readonly corner: readonly [-1 | 1, -1 | 1] | null;
}

/** Reach of a finger around a handle, CSS pixels: handles look small but are 48 pixels across. */
const REACH = 24;
/** Smallest side of a rectangle, photo pixels: fewer say little about noise. */
const LEAST_SIDE = 8;
const REFERENCE_KINDS = ['clean', 'white', 'dark'] as const;
const CORNERS = [
  [-1, -1],
  [1, -1],
  [-1, 1],
  [1, 1],
] as const;

export function sameMark(a: MarkId | null, b: MarkId | null): boolean {
  if (!a || !b || a.kind !== b.kind) return a === b;
  return !('index' in a) || ('index' in b && a.index === b.index);
}

const isReference = (mark: MarkId): mark is { readonly kind: 'clean' | 'white' | 'dark' } =>
  mark.kind !== 'pin' && mark.kind !== 'corner' && !isViewMark(mark);

/** Whether the set-up still holds this mark: undo may have taken it away. */
export function hasMark(setup: Setup, mark: MarkId): boolean {
  if (isReference(mark)) return setup.references?.[mark.kind] !== undefined;
  if (isViewMark(mark)) return viewEnds(setup, mark.kind) !== undefined;
  return (mark.kind === 'pin' ? setup.pins : setup.region)?.[mark.index] !== undefined;
}

/** The rectangle of a reference, or null for a mark that is a point. */
export function rectangleOf(setup: Setup, mark: MarkId): Rectangle | null {
  return isReference(mark) ? (setup.references?.[mark.kind] ?? null) : null;
}

/**
 * What lies under a finger at screen place (x, y): the nearest handle or pin within reach, else the body of a rectangle.
 * The selected mark wins where two are as near, so that it can be pulled off another.
 */
export function gripAt(view: View, setup: Setup, selected: MarkId | null, x: number, y: number): Grip | null {
  let best: Grip | null = null;
  let nearest = REACH;
  const offer = (grip: Grip, at: readonly [number, number]) => {
    const away = Math.hypot(at[0] - x, at[1] - y) - (sameMark(grip.mark, selected) ? 2 : 0);
    if (away < nearest) {
      nearest = away;
      best = grip;
    }
  };
  for (const kind of REFERENCE_KINDS) {
    const r = setup.references?.[kind];
    if (!r || !sameMark({ kind }, selected)) continue;
    for (const corner of CORNERS) {
      const px = corner[0] < 0 ? r[0] : r[0] + r[2];
      const py = corner[1] < 0 ? r[1] : r[1] + r[3];
      offer({ mark: { kind }, corner }, toScreen(view, px, py));
    }
  }
  setup.pins?.forEach((pin, index) => {
    offer({ mark: { kind: 'pin', index }, corner: null }, toScreen(view, pin.at[0], pin.at[1]));
  });
  setup.region?.forEach((at, index) => {
    offer({ mark: { kind: 'corner', index }, corner: null }, toScreen(view, at[0], at[1]));
  });
  for (const kind of ['horizon', 'length'] as const) {
    viewEnds(setup, kind)?.forEach((at, index) => {
      offer({ mark: { kind, index }, corner: null }, toScreen(view, at[0], at[1]));
    });
  }
  // Of a small rectangle the corners' reach would cover the body: its middle always moves it.
  for (const kind of REFERENCE_KINDS) {
    const r = setup.references?.[kind];
    if (!r) continue;
    const [left, top] = toScreen(view, r[0], r[1]);
    const [right, bottom] = toScreen(view, r[0] + r[2], r[1] + r[3]);
    const middleX = Math.abs(x - (left + right) / 2);
    const middleY = Math.abs(y - (top + bottom) / 2);
    const core = middleX <= (right - left) / 4 && middleY <= (bottom - top) / 4;
    const inside = x >= left && x <= right && y >= top && y <= bottom;
    if (core || (inside && !best)) return { mark: { kind }, corner: null };
  }
  return best;
}

const between = (value: number, low: number, high: number) => Math.min(high, Math.max(low, value));

function movedRectangle(
  r: Rectangle,
  corner: Grip['corner'],
  dx: number,
  dy: number,
  photo: Size,
): Rectangle {
  if (!corner) {
    return [
      Math.round(between(r[0] + dx, 0, photo.width - r[2])),
      Math.round(between(r[1] + dy, 0, photo.height - r[3])),
      r[2],
      r[3],
    ];
  }
  const side = (start: number, length: number, sign: -1 | 1, by: number, room: number) => {
    const end = start + length;
    if (sign < 0) {
      const from = Math.round(between(start + by, 0, end - LEAST_SIDE));
      return [from, end - from] as const;
    }
    return [start, Math.round(between(end + by, start + LEAST_SIDE, room)) - start] as const;
  };
  const [left, width] = side(r[0], r[2], corner[0], dx, photo.width);
  const [top, height] = side(r[1], r[3], corner[1], dy, photo.height);
  return [left, top, width, height];
}

function movedPoint(at: Point, dx: number, dy: number, photo: Size): Point {
  return [
    Math.round(between(at[0] + dx, 0, photo.width - 1)),
    Math.round(between(at[1] + dy, 0, photo.height - 1)),
  ];
}

/** The set-up with one mark moved, or one corner of it, by (dx, dy) photo pixels; marks stay on the photo. */
export function movedMark(setup: Setup, grip: Grip, dx: number, dy: number, photo: Size): Setup {
  const { mark } = grip;
  if (isReference(mark)) {
    const r = setup.references?.[mark.kind];
    if (!r) return setup;
    return {
      ...setup,
      references: { ...setup.references, [mark.kind]: movedRectangle(r, grip.corner, dx, dy, photo) },
    };
  }
  const { index } = mark;
  if (isViewMark(mark)) {
    const ends = viewEnds(setup, mark.kind);
    if (!ends) return setup;
    const pulled = movedPoint(ends[index === 0 ? 0 : 1], dx, dy, photo);
    return withViewEnds(setup, mark.kind, index === 0 ? [pulled, ends[1]] : [ends[0], pulled]);
  }
  if (mark.kind === 'pin') {
    if (!setup.pins) return setup;
    return {
      ...setup,
      pins: setup.pins.map((pin, i) =>
        i === index ? { ...pin, at: movedPoint(pin.at, dx, dy, photo) } : pin,
      ),
    };
  }
  if (!setup.region) return setup;
  return {
    ...setup,
    region: setup.region.map((at, i) => (i === index ? movedPoint(at, dx, dy, photo) : at)),
  };
}

/** The set-up with a rectangle grown (or shrunk, `by` < 0) by `by` photo pixels on every side, about its middle. */
export function grownMark(setup: Setup, mark: MarkId, by: number, photo: Size): Setup {
  const larger = movedMark(setup, { mark, corner: [1, 1] }, by, by, photo);
  return movedMark(larger, { mark, corner: [-1, -1] }, -by, -by, photo);
}

/** The set-up without one mark. A region of three corners is dropped whole: two corners enclose nothing. */
export function withoutMark(setup: Setup, mark: MarkId): Setup {
  if (isReference(mark)) {
    const { [mark.kind]: _, ...others } = setup.references ?? {};
    if (mark.kind !== 'white') return { ...setup, references: others };
    const { whiteReflectance: _level, ...rest } = others;
    return { ...setup, references: rest };
  }
  if (isViewMark(mark)) return withoutViewMark(setup, mark.kind);
  if (mark.kind === 'pin') return { ...setup, pins: (setup.pins ?? []).filter((_, i) => i !== mark.index) };
  const region = (setup.region ?? []).filter((_, i) => i !== mark.index);
  if (region.length >= 3) return { ...setup, region };
  const { region: _, ...rest } = setup;
  return rest;
}
