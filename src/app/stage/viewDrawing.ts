import type { Setup } from '../../engine/setup.ts';
import { draftSetup, setup, step } from '../state.ts';
import { firstTap, lengthEnds, sketch, viewTarget } from '../viewState.ts';
import type { ViewDrawing } from './drawView.ts';

/** What to draw in the view step, or null in the others. Reads signals: to be called while rendering. */
export function viewDrawing(): ViewDrawing | null {
  if (step.value !== 'view') return null;
  const { view }: Setup = draftSetup.value ?? setup.value;
  const length = view?.knownLength;
  return {
    seen: sketch.value.seen,
    horizon: view?.horizon ?? null,
    length: length?.ends ?? lengthEnds.value,
    lengthLabel: length ? `${length.lengthM} m` : '',
    first: firstTap.value,
    handles: viewTarget.value,
  };
}
