import type { ComponentChildren } from 'preact';
import { useCallback, useEffect, useRef, useState } from 'preact/hooks';
import type { Point, Rectangle } from '../../engine/setup.ts';
import {
  addPin,
  image,
  marking,
  pinOrder,
  probeAt,
  setReference,
  setRegion,
  setup,
  step,
  wipe,
} from '../state.ts';
import { drawStage } from './drawStage.ts';
import { fitted, held, panned, type Size, toPhoto, type View, zoomed } from './viewTransform.ts';

interface Props {
  readonly map: ImageBitmap | null;
  readonly onProbe: (at: Point) => void;
  /** Corners of a region being marked; kept outside so that the sheet can close it. */
  readonly corners: readonly Point[];
  readonly onCorner: (at: Point) => void;
  readonly children?: ComponentChildren;
}

/** Side of a patch placed by a single tap, as a share of the photo's shorter side. */
const TAP_PATCH = 0.06;
const KEY_STEP = 40;
/** Movement below this is a tap, CSS pixels: fingers in gloves are not steady. */
const TAP_SLACK = 8;

/** The photo as the stage: pan, pinch, wheel, keys; taps and drags mark or probe. */
export function Stage({ map, onProbe, corners, onCorner, children }: Props) {
  const canvas = useRef<HTMLCanvasElement>(null);
  const [size, setSize] = useState<Size>({ width: 390, height: 480 });
  const [view, setView] = useState<View | null>(null);
  const [draft, setDraft] = useState<Rectangle | null>(null);
  const [loupeAt, setLoupeAt] = useState<Point | null>(null);
  const pointers = useRef(new Map<number, { x: number; y: number; startX: number; startY: number }>());
  const moved = useRef(false);
  const shown = image.value;
  const photo: Size = shown
    ? { width: shown.opened.width, height: shown.opened.height }
    : { width: 1, height: 1 };
  const current = view ?? fitted(photo, size);
  const isMark = step.value === 'mark';
  const draws =
    isMark && (marking.value === 'clean' || marking.value === 'white' || marking.value === 'dark');

  useEffect(() => {
    const element = canvas.current;
    if (!element) return;
    const observer = new ResizeObserver(() => {
      setSize({ width: element.clientWidth, height: element.clientHeight });
      setView(null);
    });
    observer.observe(element);
    return () => observer.disconnect();
  }, []);

  useEffect(() => {
    const element = canvas.current;
    const context = element?.getContext('2d');
    if (!element || !context || !shown) return;
    const ratio = Math.min(3, globalThis.devicePixelRatio || 1);
    element.width = Math.round(size.width * ratio);
    element.height = Math.round(size.height * ratio);
    context.setTransform(ratio, 0, 0, ratio, 0, 0);
    drawStage(
      context,
      current,
      {
        photo: shown.bitmap,
        ...photo,
        map,
        wipe: wipe.value,
        setup: setup.value,
        probeAt: probeAt.value,
        draft: draft ? { rectangle: draft } : corners.length > 0 ? { corners } : null,
        loupeAt,
      },
      size.width,
      size.height,
    );
  });

  const place = useCallback((event: PointerEvent | WheelEvent): readonly [number, number] => {
    const box = canvas.current?.getBoundingClientRect();
    return [event.clientX - (box?.left ?? 0), event.clientY - (box?.top ?? 0)];
  }, []);

  const inPhoto = (x: number, y: number): Point => {
    const [px, py] = toPhoto(current, x, y);
    return [Math.min(photo.width - 1, Math.max(0, px)), Math.min(photo.height - 1, Math.max(0, py))];
  };

  const tap = (at: Point) => {
    const whole: Point = [Math.floor(at[0]), Math.floor(at[1])];
    if (!isMark) return onProbe(whole);
    const kind = marking.value;
    if (kind === 'region') return onCorner(whole);
    if (kind === 'bare') return addPin(whole, { is: 'bare' });
    if (kind === 'order') return addPin(whole, { order: pinOrder.value });
    const side = Math.round(TAP_PATCH * Math.min(photo.width, photo.height));
    const left = Math.round(Math.min(photo.width - side, Math.max(0, at[0] - side / 2)));
    const top = Math.round(Math.min(photo.height - side, Math.max(0, at[1] - side / 2)));
    setReference(kind, [left, top, side, side]);
  };

  const down = (event: PointerEvent) => {
    canvas.current?.setPointerCapture(event.pointerId);
    const [x, y] = place(event);
    pointers.current.set(event.pointerId, { x, y, startX: x, startY: y });
    if (pointers.current.size === 1) {
      moved.current = false;
      if (isMark) setLoupeAt(inPhoto(x, y));
    } else {
      moved.current = true;
      setDraft(null);
      setLoupeAt(null);
    }
  };

  const move = (event: PointerEvent) => {
    const own = pointers.current.get(event.pointerId);
    if (!own) return;
    const [x, y] = place(event);
    const all = [...pointers.current.values()];
    if (all.length === 2) {
      const other = all.find((p) => p !== own);
      if (other) {
        const before = Math.hypot(own.x - other.x, own.y - other.y);
        const now = Math.hypot(x - other.x, y - other.y);
        const centreX = (x + other.x) / 2;
        const centreY = (y + other.y) / 2;
        const next = zoomed(current, now / Math.max(1, before), centreX, centreY, photo, size);
        setView(panned(next, (x - own.x) / 2, (y - own.y) / 2, photo, size));
      }
    } else {
      if (Math.hypot(x - own.startX, y - own.startY) > TAP_SLACK) moved.current = true;
      if (draws && moved.current) {
        const a = inPhoto(own.startX, own.startY);
        const b = inPhoto(x, y);
        setDraft([
          Math.round(Math.min(a[0], b[0])),
          Math.round(Math.min(a[1], b[1])),
          Math.max(1, Math.round(Math.abs(a[0] - b[0]))),
          Math.max(1, Math.round(Math.abs(a[1] - b[1]))),
        ]);
      } else if (!draws && moved.current) setView(panned(current, x - own.x, y - own.y, photo, size));
      if (isMark) setLoupeAt(inPhoto(x, y));
    }
    pointers.current.set(event.pointerId, { ...own, x, y });
  };

  const up = (event: PointerEvent) => {
    const own = pointers.current.get(event.pointerId);
    pointers.current.delete(event.pointerId);
    setLoupeAt(null);
    if (!own || event.type === 'pointercancel') return setDraft(null);
    const kind = marking.value;
    if (draft && (kind === 'clean' || kind === 'white' || kind === 'dark')) setReference(kind, draft);
    else if (!moved.current) tap(inPhoto(own.x, own.y));
    setDraft(null);
  };

  const wheel = (event: WheelEvent) => {
    event.preventDefault();
    const [x, y] = place(event);
    setView(zoomed(current, Math.exp(-event.deltaY / 400), x, y, photo, size));
  };

  const middle = (): Point => inPhoto(size.width / 2, size.height / 2);
  const key = (event: KeyboardEvent) => {
    const moves: Record<string, readonly [number, number]> = {
      ArrowLeft: [KEY_STEP, 0],
      ArrowRight: [-KEY_STEP, 0],
      ArrowUp: [0, KEY_STEP],
      ArrowDown: [0, -KEY_STEP],
    };
    const by = moves[event.key];
    if (by) setView(panned(current, by[0], by[1], photo, size));
    else if (event.key === '+' || event.key === '=')
      setView(zoomed(current, 1.4, size.width / 2, size.height / 2, photo, size));
    else if (event.key === '-')
      setView(zoomed(current, 1 / 1.4, size.width / 2, size.height / 2, photo, size));
    else if (event.key === '0') setView(null);
    else if (event.key === 'Enter' || event.key === ' ') tap(middle());
    else return;
    event.preventDefault();
  };

  return (
    <div class="stage">
      {/* biome-ignore lint/a11y/noInteractiveElementToNoninteractiveRole: a canvas that is panned, zoomed and marked by keys is an application in ARIA's sense */}
      <canvas
        ref={canvas}
        tabIndex={0}
        role="application"
        aria-label="Photo. Arrows move it, plus and minus zoom, Enter marks or reads the middle."
        onPointerDown={down}
        onPointerMove={move}
        onPointerUp={up}
        onPointerCancel={up}
        onWheel={wheel}
        onKeyDown={key}
        onDblClick={(event) => {
          const box = canvas.current?.getBoundingClientRect();
          const x = event.clientX - (box?.left ?? 0);
          const y = event.clientY - (box?.top ?? 0);
          const isFitted = Math.abs(current.scale - fitted(photo, size).scale) < 1e-6;
          setView(isFitted ? zoomed(current, 3, x, y, photo, size) : held(fitted(photo, size), photo, size));
        }}
      />
      {children}
    </div>
  );
}

/** Corners closed into a region, where there are three or more. */
export function closeRegion(corners: readonly Point[]): void {
  if (corners.length >= 3) setRegion(corners);
}
