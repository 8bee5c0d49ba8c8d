import type { Point, Setup, Stroke } from '../../engine/setup.ts';

/** Full widths of the brush on the screen, CSS pixels: zooming in makes the same brush finer on the photo. */
export const BRUSHES = [
  ['Fine', 14],
  ['Medium', 30],
  ['Broad', 64],
] as const satisfies readonly (readonly [string, number])[];

/** A finger that moved less than this on the screen adds no point to its stroke, CSS pixels. */
const LEAST_STEP = 3;
/** Places are kept to a tenth of a pixel: files stay short. */
const tenth = (value: number) => Math.round(value * 10) / 10;

/** A stroke at its first touch. @param scale screen pixels a photo pixel */
export function begunStroke(paint: Stroke['paint'], at: Point, widthOnScreen: number, scale: number): Stroke {
  return {
    paint,
    points: [[tenth(at[0]), tenth(at[1])]],
    widthPx: Math.max(1, tenth(widthOnScreen / scale)),
  };
}

/** The stroke with the finger at `at`; the same stroke where the finger has hardly moved. */
export function extendedStroke(stroke: Stroke, at: Point, scale: number): Stroke {
  const last = stroke.points.at(-1);
  if (last && Math.hypot(at[0] - last[0], at[1] - last[1]) * scale < LEAST_STEP) return stroke;
  return { ...stroke, points: [...stroke.points, [tenth(at[0]), tenth(at[1])]] };
}

/** The set-up with one stroke more, over all others. */
export function painted(setup: Setup, stroke: Stroke): Setup {
  return { ...setup, strokes: [...(setup.strokes ?? []), stroke] };
}

/** Whether anything is left out by region or brush. */
export function leavesOut({ region, strokes }: Setup): boolean {
  return (region?.length ?? 0) >= 3 || (strokes?.length ?? 0) > 0;
}
