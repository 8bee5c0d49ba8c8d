import { useRef, useState } from 'preact/hooks';
import type { Point, Rectangle, Setup, Stroke } from '../../engine/setup.ts';
import {
  brush,
  change,
  draftSetup,
  marking,
  probeAt,
  result,
  selected,
  setReference,
  setup,
  step,
} from '../state.ts';
import { viewTarget } from '../viewState.ts';
import { begunStroke, extendedStroke, painted } from './brush.ts';
import { type Grip, gripAt, movedMark } from './grips.ts';
import { panned, type Size, toPhoto, toScreen, type View, zoomed } from './viewTransform.ts';

/** Movement below this is a tap, CSS pixels: fingers in gloves are not steady. */
const TAP_SLACK = 8;
/** Reach of a finger around the probe's cross, CSS pixels. */
const PROBE_REACH = 28;

interface Finger {
  readonly x: number;
  readonly y: number;
  readonly startX: number;
  readonly startY: number;
}

/** What one finger is doing, decided when it comes down. */
type Holding =
  | { readonly what: 'photo' | 'rectangle' | 'probe' | 'paint' }
  | { readonly what: 'mark'; readonly grip: Grip };

export interface Gestures {
  readonly down: (event: PointerEvent) => void;
  readonly move: (event: PointerEvent) => void;
  readonly up: (event: PointerEvent) => void;
  /** A rectangle being drawn, photo pixels. */
  readonly rectangle: Rectangle | null;
  /** Place under the finger that the loupe shows, photo pixels. */
  readonly loupeAt: Point | null;
  /** The probe's cross while it is dragged. */
  readonly probeDraft: Point | null;
}

interface Frame {
  readonly view: View;
  readonly setView: (view: View) => void;
  readonly photo: Size;
  readonly size: Size;
  readonly place: (event: PointerEvent) => readonly [number, number];
  readonly onTap: (at: Point) => void;
  readonly onProbe: (at: Point) => void;
}

/** Marks that can be held now: only those of the kind being marked, so that one never pulls at another. */
function holdable({ references, pins, region, ...rest }: Setup): Setup {
  if (step.value === 'view') return holdableInView(rest);
  const kind = marking.value;
  if (kind === 'region') return region ? { ...rest, region } : rest;
  if (kind === 'out' || kind === 'in') return rest;
  if (kind === 'bare' || kind === 'order') return pins ? { ...rest, pins } : rest;
  return references ? { ...rest, references } : rest;
}

/** In the view step only the line that taps place can be pulled. */
function holdableInView({ view, ...rest }: Setup): Setup {
  const { horizon, knownLength } = view ?? {};
  if (viewTarget.value === 'horizon') return { ...rest, view: horizon ? { horizon } : {} };
  return { ...rest, view: knownLength ? { knownLength } : {} };
}

/** One finger pans, marks, paints, pulls a mark or the probe; two fingers pan and zoom. */
export function useGestures({ view, setView, photo, size, place, onTap, onProbe }: Frame): Gestures {
  const fingers = useRef(new Map<number, Finger>());
  const holding = useRef<Holding>({ what: 'photo' });
  const moved = useRef(false);
  const stroke = useRef<Stroke | null>(null);
  const [rectangle, setRectangle] = useState<Rectangle | null>(null);
  const [loupeAt, setLoupeAt] = useState<Point | null>(null);
  const [probeDraft, setProbeDraft] = useState<Point | null>(null);

  const inPhoto = (x: number, y: number): Point => {
    const [px, py] = toPhoto(view, x, y);
    return [Math.min(photo.width - 1, Math.max(0, px)), Math.min(photo.height - 1, Math.max(0, py))];
  };

  const take = (x: number, y: number): Holding => {
    if (step.value === 'mark') {
      const grip = gripAt(view, holdable(setup.value), selected.value, x, y);
      if (grip) return { what: 'mark', grip };
      const kind = marking.value;
      if (kind === 'out' || kind === 'in') return { what: 'paint' };
      const draws = kind === 'clean' || kind === 'white' || kind === 'dark';
      // A second patch of a kind would replace the first: there a drag moves the photo, a tap the patch.
      return { what: draws && !setup.value.references?.[kind] ? 'rectangle' : 'photo' };
    }
    if (step.value === 'view') {
      const grip = gripAt(view, holdable(setup.value), selected.value, x, y);
      return grip ? { what: 'mark', grip } : { what: 'photo' };
    }
    const at = probeAt.value;
    if (step.value === 'map' && result.value && at) {
      const [px, py] = toScreen(view, at[0] + 0.5, at[1] + 0.5);
      if (Math.hypot(px - x, py - y) < PROBE_REACH) return { what: 'probe' };
    }
    return { what: 'photo' };
  };

  const letGo = () => {
    setRectangle(null);
    setLoupeAt(null);
    setProbeDraft(null);
    draftSetup.value = null;
    stroke.current = null;
  };

  const down = (event: PointerEvent) => {
    (event.currentTarget as Element).setPointerCapture(event.pointerId);
    const [x, y] = place(event);
    fingers.current.set(event.pointerId, { x, y, startX: x, startY: y });
    if (fingers.current.size > 1) {
      moved.current = true;
      holding.current = { what: 'photo' };
      return letGo();
    }
    moved.current = false;
    holding.current = take(x, y);
    if (holding.current.what === 'paint') {
      const paint = marking.value === 'in' ? 'in' : 'out';
      stroke.current = begunStroke(paint, inPhoto(x, y), brush.value, view.scale);
      draftSetup.value = painted(setup.value, stroke.current);
      return;
    }
    if (holding.current.what === 'mark') selected.value = holding.current.grip.mark;
    if (step.value === 'mark' || step.value === 'view' || holding.current.what === 'probe')
      setLoupeAt(inPhoto(x, y));
  };

  const pinch = (finger: Finger, other: Finger, x: number, y: number) => {
    const before = Math.hypot(finger.x - other.x, finger.y - other.y);
    const now = Math.hypot(x - other.x, y - other.y);
    const next = zoomed(view, now / Math.max(1, before), (x + other.x) / 2, (y + other.y) / 2, photo, size);
    setView(panned(next, (x - finger.x) / 2, (y - finger.y) / 2, photo, size));
  };

  const drag = (finger: Finger, x: number, y: number) => {
    const held = holding.current;
    if (held.what === 'photo') {
      setLoupeAt(null);
      return setView(panned(view, x - finger.x, y - finger.y, photo, size));
    }
    if (held.what === 'paint') {
      if (!stroke.current) return;
      stroke.current = extendedStroke(stroke.current, inPhoto(x, y), view.scale);
      draftSetup.value = painted(setup.value, stroke.current);
      return;
    }
    if (held.what === 'probe') setProbeDraft(inPhoto(x, y));
    else if (held.what === 'mark') {
      const dx = (x - finger.startX) / view.scale;
      const dy = (y - finger.startY) / view.scale;
      draftSetup.value = movedMark(setup.value, held.grip, dx, dy, photo);
    } else {
      const a = inPhoto(finger.startX, finger.startY);
      const b = inPhoto(x, y);
      setRectangle([
        Math.round(Math.min(a[0], b[0])),
        Math.round(Math.min(a[1], b[1])),
        Math.max(1, Math.round(Math.abs(a[0] - b[0]))),
        Math.max(1, Math.round(Math.abs(a[1] - b[1]))),
      ]);
    }
    setLoupeAt(inPhoto(x, y));
  };

  const move = (event: PointerEvent) => {
    const finger = fingers.current.get(event.pointerId);
    if (!finger) return;
    const [x, y] = place(event);
    const other = [...fingers.current.values()].find((f) => f !== finger);
    if (other) pinch(finger, other, x, y);
    else {
      if (Math.hypot(x - finger.startX, y - finger.startY) > TAP_SLACK) moved.current = true;
      // A tap may shake; a brush paints from the first pixel on.
      if (moved.current || holding.current.what === 'paint') drag(finger, x, y);
    }
    fingers.current.set(event.pointerId, { ...finger, x, y });
  };

  const up = (event: PointerEvent) => {
    const finger = fingers.current.get(event.pointerId);
    fingers.current.delete(event.pointerId);
    const next = draftSetup.value;
    const drawn = rectangle;
    letGo();
    if (!finger || event.type === 'pointercancel') return;
    const held = holding.current;
    if (held.what === 'paint') {
      // The first touch is a dot, so a stroke is there even where the finger did not move.
      if (next) change(next);
      return;
    }
    if (!moved.current) {
      if (held.what !== 'mark') onTap(inPhoto(finger.x, finger.y));
      return;
    }
    const kind = marking.value;
    if (held.what === 'mark' && next) change(next);
    else if (held.what === 'probe') onProbe(inPhoto(finger.x, finger.y));
    else if (drawn && (kind === 'clean' || kind === 'white' || kind === 'dark')) setReference(kind, drawn);
  };

  return { down, move, up, rectangle, loupeAt, probeDraft };
}
