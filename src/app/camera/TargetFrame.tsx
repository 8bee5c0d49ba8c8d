import { useEffect, useRef, useState } from 'preact/hooks';
import { squareTo } from '../../photo/homography.ts';
import type { FourCorners } from '../../photo/targetColours.ts';
import { fitted, type Size, toPhoto, toScreen } from '../stage/viewTransform.ts';

interface Props {
  readonly url: string;
  readonly photo: Size;
  readonly corners: FourCorners;
  readonly onMove: (corners: FourCorners) => void;
}

const COLUMNS = 6;
const ROWS = 4;
const GAP = 0.13;
const NAMES = ['first', 'second', 'third', 'fourth'] as const;
/** A handle's radius, CSS pixels: 48 across. */
const GRIP = 24;
const ARROWS: Readonly<Record<string, readonly [number, number]>> = {
  ArrowLeft: [-1, 0],
  ArrowRight: [1, 0],
  ArrowUp: [0, -1],
  ArrowDown: [0, 1],
};

/** The photo with the target's outline over it, and a round handle on each corner. */
export function TargetFrame({ url, photo, corners, onMove }: Props) {
  const frame = useRef<HTMLDivElement>(null);
  const [size, setSize] = useState<Size>({ width: 390, height: 480 });
  const held = useRef<{ readonly index: number; readonly dx: number; readonly dy: number } | null>(null);
  useEffect(() => {
    const element = frame.current;
    if (!element) return;
    const observer = new ResizeObserver(() =>
      setSize({ width: element.clientWidth, height: element.clientHeight }),
    );
    observer.observe(element);
    return () => observer.disconnect();
  }, []);
  // Handles may hang over the photo's edge, so a margin is left for them.
  const inner = fitted(photo, { width: size.width - 2 * GRIP, height: size.height - 2 * GRIP });
  const view = { scale: inner.scale, x: inner.x + GRIP, y: inner.y + GRIP };
  const onScreen = corners.map(([x, y]) => toScreen(view, x, y)) as unknown as FourCorners;
  const path = onScreen.map(([x, y]) => `${x},${y}`).join(' ');

  const put = (index: number, x: number, y: number) => {
    const [px, py] = toPhoto(view, x, y);
    const at = [
      Math.min(photo.width - 1, Math.max(0, px)),
      Math.min(photo.height - 1, Math.max(0, py)),
    ] as const;
    onMove(corners.map((corner, k) => (k === index ? at : corner)) as unknown as FourCorners);
  };
  const place = (event: PointerEvent): readonly [number, number] => {
    const box = frame.current?.getBoundingClientRect();
    return [event.clientX - (box?.left ?? 0), event.clientY - (box?.top ?? 0)];
  };

  return (
    <div class="target-frame" ref={frame}>
      {/* An image element, because it heeds the photo's own orientation. */}
      <img
        src={url}
        alt=""
        style={{
          left: `${view.x}px`,
          top: `${view.y}px`,
          width: `${photo.width * view.scale}px`,
          height: `${photo.height * view.scale}px`,
        }}
      />
      <svg
        aria-label="Photo of the colour target with four corners to drag"
        onPointerMove={(event) => {
          const now = held.current;
          if (!now) return;
          const [x, y] = place(event);
          put(now.index, x - now.dx, y - now.dy);
        }}
        onPointerUp={() => {
          held.current = null;
        }}
        onPointerCancel={() => {
          held.current = null;
        }}
      >
        <polygon class="shade" points={path} />
        <polygon class="outline" points={path} />
        {cells(onScreen).map((points) => (
          <polygon key={points} class="cell" points={points} />
        ))}
        {onScreen.map(([x, y], index) => (
          <circle key={NAMES[index]} class="point" cx={x} cy={y} r={3} />
        ))}
        {onScreen.map(([x, y], index) => (
          // biome-ignore lint/a11y/useSemanticElements: a handle inside a drawing cannot be an HTML control
          <circle
            key={NAMES[index]}
            class="grip"
            cx={x}
            cy={y}
            r={GRIP}
            tabIndex={0}
            role="button"
            aria-label={`The ${NAMES[index]} corner: arrows move it`}
            onPointerDown={(event) => {
              const [px, py] = place(event);
              held.current = { index, dx: px - x, dy: py - y };
              event.currentTarget.setPointerCapture(event.pointerId);
              event.preventDefault();
            }}
            onKeyDown={(event) => {
              const by = ARROWS[event.key];
              if (!by) return;
              const far = event.shiftKey ? 10 : 2;
              put(index, x + by[0] * far, y + by[1] * far);
              event.preventDefault();
            }}
          />
        ))}
      </svg>
    </div>
  );
}

/** Outlines of the parts of the patches that will be read. */
function cells(corners: FourCorners): string[] {
  const place = squareTo(corners);
  const middle = (k: number, count: number) => (k * (1 + GAP) + 0.5) / (count + (count - 1) * GAP);
  const half = (count: number) => 0.25 / (count + (count - 1) * GAP);
  return Array.from({ length: COLUMNS * ROWS }, (_, k) => {
    const u = middle(k % COLUMNS, COLUMNS);
    const v = middle(Math.floor(k / COLUMNS), ROWS);
    const [a, b] = [half(COLUMNS), half(ROWS)];
    const outline = [place(u - a, v - b), place(u + a, v - b), place(u + a, v + b), place(u - a, v + b)];
    return outline.map(([x, y]) => `${x.toFixed(1)},${y.toFixed(1)}`).join(' ');
  });
}
