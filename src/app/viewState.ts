import { computed, signal } from '@preact/signals';
import {
  type LensFacts,
  type MissingView,
  missingOfView,
  type SketchedView,
  sketchView,
} from '../engine/partialView.ts';
import type { Point, ViewSetup } from '../engine/setup.ts';
import { change, draftSetup, image, selected, setup } from './state.ts';

/** How a person tells where the camera looked. */
export type ViewMode = 'horizon' | 'tilt' | 'down';
/** What taps on the photo place in the view step. */
export type ViewTarget = 'horizon' | 'length';

/** Chosen by hand; what the set-up says goes before it, so that an undo brings its way of telling back. */
const chosenMode = signal<ViewMode | null>(null);
export const viewTarget = signal<ViewTarget>('horizon');
/** The first of two taps, until the second is made. */
export const firstTap = signal<Point | null>(null);
/** Two ends of a length whose metres are not typed yet. */
export const lengthEnds = signal<readonly [Point, Point] | null>(null);

/** The horizon that was put away for another way of telling: choosing it again brings it back. */
let putAway: ViewSetup['horizon'];

/** Straight down is a pitch of -90 degrees. */
const DOWN_DEG = -90;

export const viewMode = computed<ViewMode>(() => {
  const { horizon, pitchDeg, pixelSizeM } = setup.value.view ?? {};
  if (horizon) return 'horizon';
  if (pixelSizeM !== undefined) return 'down';
  if (pitchDeg !== undefined) return pitchDeg === DOWN_DEG && chosenMode.value !== 'tilt' ? 'down' : 'tilt';
  return chosenMode.value === 'tilt' ? 'tilt' : 'horizon';
});

export function lensFacts(): LensFacts {
  const opened = image.value?.opened;
  return {
    width: opened?.width ?? 1,
    height: opened?.height ?? 1,
    focalLength35mm: opened?.metadata.focalLength35mm,
  };
}

export const missingView = computed<readonly MissingView[]>(() =>
  missingOfView(setup.value.view, lensFacts()),
);

/** The view to draw, or the sentence that says why there is none. */
export const sketch = computed<{ readonly seen: SketchedView | null; readonly fault: string | null }>(() => {
  try {
    return { seen: sketchView((draftSetup.value ?? setup.value).view, lensFacts()), fault: null };
  } catch (error) {
    return { seen: null, fault: error instanceof Error ? error.message : String(error) };
  }
});

/** Changes part of the view; `undefined` takes a field away. */
export function changeView(
  patch: { readonly [K in keyof ViewSetup]?: ViewSetup[K] | undefined },
  series: string | null = null,
): void {
  const next = Object.fromEntries(
    Object.entries({ ...setup.value.view, ...patch }).filter(([, value]) => value !== undefined),
  ) as ViewSetup;
  const { view: _, ...rest } = setup.value;
  change(Object.keys(next).length > 0 ? { ...rest, view: next } : rest, series);
}

/** Chooses how the tilt is told; what another way said is put away. */
export function chooseViewMode(mode: ViewMode): void {
  if (mode === viewMode.value) return;
  chosenMode.value = mode;
  firstTap.value = null;
  selected.value = null;
  viewTarget.value = 'horizon';
  const { horizon, pitchDeg, pixelSizeM } = setup.value.view ?? {};
  const said = horizon ?? pitchDeg ?? pixelSizeM;
  const none = { horizon: undefined, pitchDeg: undefined, rollDeg: undefined, pixelSizeM: undefined };
  if (horizon) putAway = horizon;
  if (mode === 'down') changeView({ ...none, pitchDeg: DOWN_DEG });
  else if (mode === 'horizon' && putAway) changeView({ ...none, horizon: putAway });
  else if (said !== undefined) changeView(none);
}

/** To be called when the step is entered: nothing half done from before. */
export function beginView(): void {
  chosenMode.value = null;
  putAway = undefined;
  firstTap.value = null;
  lengthEnds.value = null;
  viewTarget.value = 'horizon';
  selected.value = null;
}

/** Two places, or one that waits for its second; a third tap moves the nearer of the two. */
export function tapView(at: Point): void {
  const target = viewTarget.value;
  if (target === 'horizon' && viewMode.value !== 'horizon') return;
  const { horizon, knownLength } = setup.value.view ?? {};
  const set = target === 'horizon' ? horizon : (knownLength?.ends ?? lengthEnds.value);
  if (!set && !firstTap.value) {
    firstTap.value = at;
    return;
  }
  const pair: readonly [Point, Point] = set ? withNearerMoved(set, at) : [firstTap.value ?? at, at];
  firstTap.value = null;
  if (target === 'horizon') changeView({ horizon: pair[0][0] <= pair[1][0] ? pair : [pair[1], pair[0]] });
  else if (knownLength) changeView({ knownLength: { ...knownLength, ends: pair } });
  else lengthEnds.value = pair;
}

/** Takes back a first tap that waits for its second. @returns whether there was one */
export function undoTap(): boolean {
  const waits = firstTap.value !== null;
  firstTap.value = null;
  return waits;
}

function withNearerMoved(pair: readonly [Point, Point], at: Point): readonly [Point, Point] {
  const away = (end: Point) => Math.hypot(end[0] - at[0], end[1] - at[1]);
  return away(pair[0]) <= away(pair[1]) ? [at, pair[1]] : [pair[0], at];
}
