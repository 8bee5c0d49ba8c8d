import type { FilmScene } from '../match/filmBasis.ts';
import type { ReadingRules } from '../match/mapPixels.ts';
import type { PhotoPixels } from '../photo/types.ts';
import { bareLimits } from './bareLimits.ts';
import { canBeBare } from './prepareScene.ts';
import type { SeenAngles } from './seenAngles.ts';
import type { Setup } from './setup.ts';

/** Squared distance (in noise) of colours that are no film: about 18 codes. */
const OUTLIER_DISTANCE = 100;
/** Oil thinner than this cannot be told from bare water by eye or camera (the codes start at 40 nm). */
const BARE_NM = 8;
const AMBIGUITY_MARGIN = 0.7;

/** The charts of all angles with what counts as bare at each: waves tilt the water of this photo. */
export function withBareLimits(
  seen: SeenAngles,
  pixels: PhotoPixels,
  leftOut: Uint8Array | null,
): SeenAngles {
  return { ...seen, charts: { ...seen.charts, bareNm: bareLimits(pixels, leftOut, seen, BARE_NM) } };
}

/** What is decided about pixels beyond their colour, for a film and its resolvable range. */
export function rulesFor(setup: Setup, scene: FilmScene, resolvableNm: number): ReadingRules {
  return {
    outlierDistance: OUTLIER_DISTANCE,
    bareNm: canBeBare(setup, scene.stack) ? BARE_NM : 0,
    resolvableNm,
    ambiguityMargin: AMBIGUITY_MARGIN,
  };
}
