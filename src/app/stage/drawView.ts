import type { SketchedView } from '../../engine/partialView.ts';
import type { Point } from '../../engine/setup.ts';
import { horizonDipRad, horizonInPhoto } from '../../view/horizon.ts';
import { LIMIT_RAD, WARNING_RAD } from '../../view/viewLimits.ts';
import { incidenceAtRad, placeOf, type WaterView } from '../../view/waterView.ts';
import { toScreen, type View } from './viewTransform.ts';

/** What the view step shows over the photo. */
export interface ViewDrawing {
  readonly seen: SketchedView | null;
  readonly horizon: readonly [Point, Point] | null;
  readonly length: readonly [Point, Point] | null;
  readonly lengthLabel: string;
  /** The first of two taps, waiting for its second. */
  readonly first: Point | null;
  /** Which line's handles are shown. */
  readonly handles: 'horizon' | 'length' | null;
}

const HORIZON = '#ffe08a';
const LENGTH = '#7fd6ff';
const WEAK = '#ffd08a';
const LEFT_OUT = '#ff9d8f';
const HALO = 'rgba(0,0,0,.75)';
/** Distances ahead that may be shown, metres. */
const DISTANCES_M = [1, 2, 5, 10, 20, 50, 100, 200, 500, 1000, 2000, 5000, 10_000];
/** Least room between two distances, CSS pixels. */
const ROOM = 26;

/** Bands of weak and left-out water, distances, and the lines that taps placed. All in CSS pixels of the stage. */
export function drawView(
  context: CanvasRenderingContext2D,
  screen: View,
  photo: { readonly width: number; readonly height: number },
  drawing: ViewDrawing,
): void {
  context.save();
  const [left, top] = toScreen(screen, 0, 0);
  context.beginPath();
  context.rect(left, top, photo.width * screen.scale, photo.height * screen.scale);
  context.clip();
  if (drawing.seen) {
    drawShade(context, screen, photo, drawing.seen.view);
    drawLimit(context, screen, photo, drawing.seen.view);
    const { view, hasScale } = drawing.seen;
    if (hasScale && isFromAbove(view)) drawBar(context, screen, photo, view);
    else if (hasScale) drawDistances(context, screen, photo, view);
  }
  const { horizon, length, first, handles } = drawing;
  if (horizon) drawHorizon(context, screen, photo, horizon, drawing.seen?.view ?? null);
  if (length) {
    line(
      context,
      length.map(([x, y]) => toScreen(screen, x, y)),
      LENGTH,
      3,
    );
    if (drawing.lengthLabel) {
      const [x, y] = toScreen(screen, (length[0][0] + length[1][0]) / 2, (length[0][1] + length[1][1]) / 2);
      label(context, drawing.lengthLabel, x, y - 10, LENGTH, 'center');
    }
  }
  context.restore();
  if (handles === 'horizon')
    for (const end of horizon ?? []) handle(context, toScreen(screen, ...end), HORIZON);
  if (handles === 'length') for (const end of length ?? []) handle(context, toScreen(screen, ...end), LENGTH);
  if (first) handle(context, toScreen(screen, ...first), handles === 'length' ? LENGTH : HORIZON);
}

/** Cells of the shading: small enough to follow the lines, few enough to draw under a finger. */
const CELLS = 64;
let shade: { readonly key: string; readonly picture: OffscreenCanvas } | null = null;

/** Water past 75 degrees is dimmed, water past 60 a little. */
function drawShade(
  context: CanvasRenderingContext2D,
  screen: View,
  photo: { readonly width: number; readonly height: number },
  view: WaterView,
): void {
  const key = JSON.stringify([view.camera, view.pitchRad, view.rollRad]);
  if (shade?.key !== key) {
    const columns = CELLS;
    const rows = Math.max(1, Math.round((CELLS * photo.height) / photo.width));
    const picture = new OffscreenCanvas(columns, rows);
    const inner = picture.getContext('2d');
    if (!inner) return;
    const cells = inner.createImageData(columns, rows);
    for (let row = 0; row < rows; row++) {
      for (let column = 0; column < columns; column++) {
        const x = ((column + 0.5) * photo.width) / columns;
        const y = ((row + 0.5) * photo.height) / rows;
        const angle = incidenceAtRad(view, x, y);
        const at = 4 * (row * columns + column);
        cells.data[at + 3] = angle >= Math.PI / 2 || angle <= WARNING_RAD ? 0 : angle > LIMIT_RAD ? 150 : 60;
      }
    }
    inner.putImageData(cells, 0, 0);
    shade = { key, picture };
  }
  const [left, top] = toScreen(screen, 0, 0);
  context.imageSmoothingEnabled = true;
  context.drawImage(shade.picture, left, top, photo.width * screen.scale, photo.height * screen.scale);
}

/** The lines at 60 and 75 degrees from the vertical, each a circle on the water. */
function drawLimit(
  context: CanvasRenderingContext2D,
  screen: View,
  photo: { readonly width: number; readonly height: number },
  view: WaterView,
): void {
  const limits = [
    [LIMIT_RAD, LEFT_OUT, '↑ left out beyond here'],
    [WARNING_RAD, WEAK, '↑ weak colours from here'],
  ] as const;
  let above: number | null = null;
  for (const [angle, colour, words] of limits) {
    const radiusM = view.heightM * Math.tan(angle);
    const runs: (readonly [number, number])[][] = [[]];
    for (let i = 0; i <= 180; i++) {
      const bearing = ((i - 90) * Math.PI) / 90;
      const at = placeOf(view, radiusM * Math.sin(bearing), radiusM * Math.cos(bearing));
      if (at && Math.abs(at[0]) < 9 * photo.width && Math.abs(at[1]) < 9 * photo.height)
        runs.at(-1)?.push(toScreen(screen, at[0], at[1]));
      else if (runs.at(-1)?.length) runs.push([]);
    }
    for (const run of runs) line(context, run, colour, 2, [9, 5]);
    const middle = placeOf(view, 0, radiusM);
    const isSeen = middle && middle[1] > 0 && middle[1] < photo.height;
    if (!middle || !isSeen) continue;
    const [, y] = toScreen(screen, middle[0], middle[1]);
    // To the right, clear of the distances on the left.
    const [right] = toScreen(screen, photo.width, 0);
    // Lines that lie close: the lower one's words go below it.
    label(context, words, right - 10, above !== null && y - above < 26 ? y + 18 : y - 7, colour, 'right');
    above = y;
  }
}

/** Looking down so steeply that distances ahead mean little. */
const isFromAbove = (view: WaterView) => view.pitchRad < (-85 * Math.PI) / 180;

/** A bar of round length, for a photo from above. */
function drawBar(
  context: CanvasRenderingContext2D,
  screen: View,
  photo: { readonly width: number; readonly height: number },
  view: WaterView,
): void {
  const metreOnScreen = (view.camera.focalPx / view.heightM) * screen.scale;
  const mostM = 150 / metreOnScreen;
  const decade = 10 ** Math.floor(Math.log10(mostM));
  const lengthM = decade * (mostM / decade >= 5 ? 5 : mostM / decade >= 2 ? 2 : 1);
  const [x, y] = toScreen(screen, 0, photo.height);
  const [from, to, at] = [x + 16, x + 16 + lengthM * metreOnScreen, y - 18];
  line(
    context,
    [
      [from, at - 6],
      [from, at],
      [to, at],
      [to, at - 6],
    ],
    '#fff',
    3,
  );
  label(
    context,
    lengthM < 1 ? `${Number((100 * lengthM).toPrecision(1))} cm` : `${lengthM} m`,
    (from + to) / 2,
    at - 8,
    '#fff',
    'center',
  );
}

/** Distances along the water straight ahead of the lens, as short rungs. */
function drawDistances(
  context: CanvasRenderingContext2D,
  screen: View,
  photo: { readonly width: number; readonly height: number },
  view: WaterView,
): void {
  let before = Number.POSITIVE_INFINITY;
  for (const distanceM of DISTANCES_M) {
    if (Math.atan2(distanceM, view.heightM) > LIMIT_RAD) return;
    const at = placeOf(view, 0, distanceM);
    if (!at || at[1] < 0 || at[1] >= photo.height) continue;
    const [, y] = toScreen(screen, at[0], at[1]);
    if (before - y < ROOM) continue;
    before = y;
    const [x] = toScreen(screen, 0.06 * photo.width, 0);
    line(
      context,
      [
        [x, y],
        [x + 18, y],
      ],
      '#fff',
      2,
    );
    label(
      context,
      distanceM < 1000 ? `${distanceM} m` : `${distanceM / 1000} km`,
      x + 24,
      y + 5,
      '#fff',
      'left',
    );
  }
}

/** The horizon as it follows from the two places, across the whole photo; straight between them until the lens is known. */
function drawHorizon(
  context: CanvasRenderingContext2D,
  screen: View,
  photo: { readonly width: number },
  ends: readonly [Point, Point],
  view: WaterView | null,
): void {
  const places = view ? horizonInPhoto(view.camera, view, horizonDipRad(view.heightM)) : [];
  const [a, b] = ends;
  const slope = (b[1] - a[1]) / (b[0] - a[0] || 1);
  const straight: Point[] = [0, photo.width].map((x) => [x, a[1] + slope * (x - a[0])]);
  line(
    context,
    (places.length > 1 ? places : straight).map(([x, y]) => toScreen(screen, x, y)),
    HORIZON,
    2,
  );
}

function line(
  context: CanvasRenderingContext2D,
  points: readonly (readonly [number, number])[],
  colour: string,
  width: number,
  dash: number[] = [],
): void {
  if (points.length < 2) return;
  context.setLineDash(dash);
  for (const [style, size] of [
    [HALO, width + 2],
    [colour, width],
  ] as const) {
    context.beginPath();
    for (const [x, y] of points) context.lineTo(x, y);
    context.strokeStyle = style;
    context.lineWidth = size;
    context.stroke();
  }
  context.setLineDash([]);
}

function label(
  context: CanvasRenderingContext2D,
  words: string,
  x: number,
  y: number,
  colour: string,
  align: CanvasTextAlign,
): void {
  context.font = '600 14px system-ui';
  context.textAlign = align;
  context.lineWidth = 4;
  context.lineJoin = 'round';
  context.strokeStyle = 'rgba(0,0,0,.85)';
  context.strokeText(words, x, y);
  context.fillStyle = colour;
  context.fillText(words, x, y);
  context.textAlign = 'start';
}

/** A ring with a free middle, so that the horizon can be seen inside it. */
function handle(context: CanvasRenderingContext2D, [x, y]: readonly [number, number], colour: string): void {
  for (const [style, size] of [
    [HALO, 6],
    [colour, 3],
  ] as const) {
    context.beginPath();
    context.arc(x, y, 12, 0, 2 * Math.PI);
    context.strokeStyle = style;
    context.lineWidth = size;
    context.stroke();
  }
}
