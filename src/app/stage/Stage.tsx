import type { ComponentChildren } from 'preact';
import { useEffect, useRef, useState } from 'preact/hooks';
import type { Point, Rectangle } from '../../engine/setup.ts';
import {
  addPin,
  brush,
  change,
  draftSetup,
  image,
  marking,
  pinOrder,
  probeAt,
  selected,
  setReference,
  setup,
  step,
  wipe,
} from '../state.ts';
import { tapView } from '../viewState.ts';
import { begunStroke, painted } from './brush.ts';
import { drawStage } from './drawStage.ts';
import { movedMark, withoutMark } from './grips.ts';
import { useGestures } from './useGestures.ts';
import { viewDrawing } from './viewDrawing.ts';
import { fitted, held, panned, recentred, type Size, toPhoto, type View, zoomed } from './viewTransform.ts';

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
const ARROWS: Readonly<Record<string, readonly [number, number]>> = {
  ArrowLeft: [-1, 0],
  ArrowRight: [1, 0],
  ArrowUp: [0, -1],
  ArrowDown: [0, 1],
};

/** A rectangle of the given size about a place, kept on the photo. */
function rectangleAbout(at: Point, width: number, height: number, photo: Size): Rectangle {
  return [
    Math.round(Math.min(photo.width - width, Math.max(0, at[0] - width / 2))),
    Math.round(Math.min(photo.height - height, Math.max(0, at[1] - height / 2))),
    width,
    height,
  ];
}

/** The photo as the stage: pan, pinch, wheel, keys; taps and drags mark or probe. */
export function Stage({ map, onProbe, corners, onCorner, children }: Props) {
  const canvas = useRef<HTMLCanvasElement>(null);
  const [size, setSize] = useState<Size>({ width: 390, height: 480 });
  const [view, setView] = useState<View | null>(null);
  const shown = image.value;
  const photo: Size = shown
    ? { width: shown.opened.width, height: shown.opened.height }
    : { width: 1, height: 1 };
  const whole = fitted(photo, size);
  const current = view ?? whole;
  const isMark = step.value === 'mark';
  const isView = step.value === 'view';
  // Read while rendering, so that the stage is drawn anew when one of them changes.
  const shows = {
    wipe: wipe.value,
    setup: draftSetup.value ?? setup.value,
    showMarks: step.value !== 'map' && step.value !== 'amount' && !isView,
    viewDrawing: viewDrawing(),
    selected: isMark ? selected.value : null,
    handles: isMark ? marking.value : null,
  };
  const readAt = step.value === 'map' ? probeAt.value : null;

  useEffect(() => {
    const element = canvas.current;
    if (!element) return;
    let before: Size | null = null;
    const observer = new ResizeObserver(() => {
      const after = { width: element.clientWidth, height: element.clientHeight };
      const old = before;
      before = after;
      setSize(after);
      if (old) setView((now) => (now ? recentred(now, old, after, photo) : null));
    });
    observer.observe(element);
    return () => observer.disconnect();
  }, [photo.width, photo.height]);

  // A new photo is shown whole.
  useEffect(() => setView(null), [shown]);

  const place = (event: PointerEvent | WheelEvent | MouseEvent): readonly [number, number] => {
    const box = canvas.current?.getBoundingClientRect();
    return [event.clientX - (box?.left ?? 0), event.clientY - (box?.top ?? 0)];
  };

  const tap = (at: Point) => {
    const inside: Point = [Math.floor(at[0]), Math.floor(at[1])];
    if (isView) return tapView(inside);
    if (!isMark) return onProbe(inside);
    const kind = marking.value;
    if (kind === 'region') return onCorner(inside);
    if (kind === 'out' || kind === 'in')
      return change(painted(setup.value, begunStroke(kind, inside, brush.value, current.scale)));
    if (kind === 'bare') return addPin(inside, { is: 'bare' });
    if (kind === 'order') return addPin(inside, { order: pinOrder.value });
    const side = Math.round(TAP_PATCH * Math.min(photo.width, photo.height));
    const [, , width, height] = setup.value.references?.[kind] ?? [0, 0, side, side];
    setReference(kind, rectangleAbout(at, width, height, photo));
  };

  const gestures = useGestures({ view: current, setView, photo, size, place, onTap: tap, onProbe });

  useEffect(() => {
    const element = canvas.current;
    const context = element?.getContext('2d');
    if (!element || !context || !shown) return;
    const ratio = Math.min(3, globalThis.devicePixelRatio || 1);
    const width = Math.round(size.width * ratio);
    const height = Math.round(size.height * ratio);
    // Setting the size clears and allocates anew: only when it changed.
    if (element.width !== width) element.width = width;
    if (element.height !== height) element.height = height;
    context.setTransform(ratio, 0, 0, ratio, 0, 0);
    const { rectangle } = gestures;
    drawStage(
      context,
      current,
      {
        photo: shown.bitmap,
        ...photo,
        map,
        ...shows,
        probeAt: readAt ? (gestures.probeDraft ?? readAt) : null,
        draft: rectangle ? { rectangle } : corners.length > 0 ? { corners } : null,
        loupeAt: gestures.loupeAt,
      },
      size.width,
      size.height,
    );
  });

  const zoomBy = (factor: number, x = size.width / 2, y = size.height / 2) =>
    setView(zoomed(current, factor, x, y, photo, size));

  const key = (event: KeyboardEvent) => {
    const by = ARROWS[event.key];
    const mark = isMark || isView ? selected.value : null;
    if (by && mark) {
      const one = event.shiftKey ? 10 : 2;
      const grip = { mark, corner: null };
      change(movedMark(setup.value, grip, by[0] * one, by[1] * one, photo), `move ${JSON.stringify(mark)}`);
    } else if (by) setView(panned(current, -by[0] * KEY_STEP, -by[1] * KEY_STEP, photo, size));
    else if (event.key === '+' || event.key === '=') zoomBy(1.4);
    else if (event.key === '-') zoomBy(1 / 1.4);
    else if (event.key === '0') setView(null);
    else if (event.key === 'Escape' && mark) selected.value = null;
    else if ((event.key === 'Delete' || event.key === 'Backspace') && mark)
      change(withoutMark(setup.value, mark));
    else if (event.key === 'Enter' || event.key === ' ') {
      const [x, y] = toPhoto(current, size.width / 2, size.height / 2);
      tap([x, y]);
    } else return;
    event.preventDefault();
  };

  return (
    <div class="stage">
      {/* biome-ignore lint/a11y/noInteractiveElementToNoninteractiveRole: a canvas that is panned, zoomed and marked by keys is an application in ARIA's sense */}
      <canvas
        ref={canvas}
        tabIndex={0}
        role="application"
        aria-label="Photo. Arrows move it or the chosen mark, plus and minus zoom, Enter marks or reads the middle, Delete removes the chosen mark."
        onPointerDown={gestures.down}
        onPointerMove={gestures.move}
        onPointerUp={gestures.up}
        onPointerCancel={gestures.up}
        onWheel={(event) => {
          event.preventDefault();
          zoomBy(Math.exp(-event.deltaY / 400), ...place(event));
        }}
        onKeyDown={key}
        onDblClick={(event) => {
          // In marking, two quick taps are two marks.
          if (isMark || isView) return;
          const isWhole = Math.abs(current.scale - whole.scale) < 1e-6;
          if (isWhole) zoomBy(3, ...place(event));
          else setView(held(whole, photo, size));
        }}
      />
      {children}
    </div>
  );
}
