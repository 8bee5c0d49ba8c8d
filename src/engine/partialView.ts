import type { WaterView } from '../view/waterView.ts';
import { viewOver } from './photoView.ts';
import type { Setup, ViewSetup } from './setup.ts';

/** Pixels that were measured, and what the photo itself says of its lens. */
export interface LensFacts {
  readonly width: number;
  readonly height: number;
  readonly focalLength35mm?: number | undefined;
}

/** What a set-up leaves open, in the order in which a person should fill it. */
export type MissingView = 'height' | 'focal' | 'tilt';

/** What is still needed before every pixel has its place on the water; empty where nothing is. */
export function missingOfView(view: ViewSetup | undefined, photo: LensFacts): readonly MissingView[] {
  const { heightM, focal35mm, horizon, pitchDeg, pixelSizeM, knownLength } = view ?? {};
  if (pixelSizeM !== undefined) return [];
  const missing: MissingView[] = [];
  if (heightM === undefined && !knownLength?.sets) missing.push('height');
  if (focal35mm === undefined && photo.focalLength35mm === undefined) missing.push('focal');
  if (!horizon && pitchDeg === undefined) missing.push('tilt');
  return missing;
}

/** The set-up as the engine takes it: a view that is only half filled in is left out, so that nothing is made up. */
export function withWholeView(setup: Setup, photo: LensFacts): Setup {
  if (!setup.view || missingOfView(setup.view, photo).length === 0) return setup;
  const { view: _, ...rest } = setup;
  return rest;
}

/** A view to draw over the photo while it is still being told: angles are right as soon as the tilt is known. */
export interface SketchedView {
  readonly view: WaterView;
  /** False while the height is open: then `view` has a height of 1 m and no distance is to be shown. */
  readonly hasScale: boolean;
}

/**
 * The camera over the water as far as a set-up describes it; null without focal length or tilt.
 * @throws RangeError with a sentence where what is said contradicts itself
 */
export function sketchView(view: ViewSetup | undefined, photo: LensFacts): SketchedView | null {
  if (!view) return null;
  const missing = missingOfView(view, photo);
  const focal35mm = view.focal35mm ?? photo.focalLength35mm;
  if (focal35mm === undefined || missing.includes('tilt')) return null;
  const { knownLength, ...rest } = view;
  const told: ViewSetup = {
    ...rest,
    // A length that only checks the view has no say in it, and may still be on its way to the water.
    ...(knownLength?.sets ? { knownLength } : {}),
    focal35mm,
    heightM: view.heightM ?? 1,
  };
  const seen = viewOver(told, photo.width, photo.height).view;
  return seen && { view: seen, hasScale: !missing.includes('height') };
}
