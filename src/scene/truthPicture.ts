import { type Scene, TRUE_KIND } from './types.ts';

/** Code for "neither film nor bare surface" in a truth picture. */
export const NO_TRUTH = 65535;
/** Codes a nanometre in a truth picture: steps of 0.04 nm, up to 2621 nm. */
export const TRUTH_CODES_PER_NM = 25;

export interface TruthPicture {
  readonly width: number;
  readonly height: number;
  readonly data: Uint16Array;
}

/**
 * True thickness of every `step`th pixel each way as 16-bit codes: picture pixel (i, j) tells of the scene's pixel
 * (i step + step/2, j step + step/2), rounded down. 0 is bare; film that mirrors something solid has no code.
 */
export function thinOutTruth(scene: Scene, step: number): TruthPicture {
  const width = Math.floor(scene.width / step);
  const height = Math.floor(scene.height / step);
  const data = new Uint16Array(width * height);
  const half = Math.floor(step / 2);
  for (let j = 0; j < height; j++) {
    for (let i = 0; i < width; i++) {
      const at = (j * step + half) * scene.width + i * step + half;
      const kind = scene.kind[at];
      data[j * width + i] =
        kind === TRUE_KIND.film || kind === TRUE_KIND.bare
          ? Math.round(scene.thicknessNm[at]! * TRUTH_CODES_PER_NM)
          : NO_TRUTH;
    }
  }
  return { width, height, data };
}
