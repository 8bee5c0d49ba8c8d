import { type ActivityMap, activityMap } from '../match/activity.ts';
import type { CandidateField } from '../match/candidates.ts';
import type { PixelReader } from '../match/pixelReader.ts';
import { type TextureMap, textureMap } from '../match/texture.ts';
import type { PhotoPixels } from '../photo/types.ts';
import { type Calibration, calibrate, type OnStep } from './calibrate.ts';
import { emptyField } from './estimate.ts';
import { leftOutOf } from './leftOut.ts';
import { makeReader } from './seenAngles.ts';
import type { Setup } from './setup.ts';
import { changeBetween } from './setupChanges.ts';

/** What a photo's fit leaves behind for a second reading with other pins: the fit itself and the colours already met. */
export interface KeptFit {
  readonly setup: Setup;
  readonly leftOut: Uint8Array;
  readonly activity: ActivityMap;
  readonly texture: TextureMap;
  readonly calibration: Calibration;
  readonly reader: PixelReader;
  /** Room for the candidates; to be filled anew for each reading, since pins change it. */
  readonly field: CandidateField;
}

/**
 * The fit for a set-up: the one kept where only pins, trend or words of the record changed, which is then exactly what a
 * new fit would be, since those take no part in it.
 * @throws SetupError, PhotoError as `calibrate` does
 */
export function keepFit(
  pixels: PhotoPixels,
  setup: Setup,
  kept: KeptFit | null,
  onStep: OnStep = () => {},
): KeptFit {
  const change = kept ? changeBetween(kept.setup, setup) : 'all';
  if (kept && (change === 'none' || change === 'orders')) return { ...kept, setup };
  const texture = kept?.texture ?? textureMap(pixels);
  const leftOut = leftOutOf(pixels, setup, texture);
  const activity = kept?.activity ?? activityMap(pixels);
  const calibration = calibrate(pixels, setup, leftOut, activity, onStep);
  const reader = makeReader(pixels, activity, calibration);
  return { setup, leftOut, activity, texture, calibration, reader, field: kept?.field ?? emptyField(pixels) };
}
