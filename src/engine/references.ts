import type { ReferenceEvidence } from '../match/fitCamera.ts';
import { type RegionMean, regionMean } from '../photo/regionMean.ts';
import type { PhotoPixels } from '../photo/types.ts';
import type { Notice } from './contract.ts';
import { SetupError } from './prepareScene.ts';
import type { Rectangle, Setup } from './setup.ts';

/** What the marked references say, ready for the fit. */
export interface References {
  readonly evidence: readonly ReferenceEvidence[];
  readonly clean: RegionMean | null;
  readonly white: RegionMean | null;
  readonly whiteReflectance: number | null;
  readonly notices: readonly Notice[];
}

/** How far the middle of a marked patch may be off for reasons other than noise, codes of 255. */
const PATCH_SD = 0.7;
const MOST_CLIPPED = 0.02;

function read(pixels: PhotoPixels, rectangle: Rectangle, what: string): RegionMean {
  const mean = regionMean(pixels, rectangle);
  if (mean.count < 16)
    throw new SetupError(`The ${what} reference covers only ${mean.count} pixels; mark a larger patch.`);
  return mean;
}

function evidence(
  kind: ReferenceEvidence['kind'],
  mean: RegionMean,
  maxCode: number,
  reflectance: number | null,
): ReferenceEvidence {
  const scale = 255 / maxCode;
  const spread = (Math.max(...mean.sd) * scale) / Math.sqrt(mean.count);
  return {
    kind,
    codes: [mean.mean[0] * scale, mean.mean[1] * scale, mean.mean[2] * scale],
    sd: Math.hypot(PATCH_SD, spread),
    reflectance,
  };
}

/**
 * Reads the marked references.
 * @throws SetupError for a clipped card or a patch too small; PhotoError for a patch off the photo
 */
export function readReferences(pixels: PhotoPixels, setup: Setup): References {
  const marked = setup.references ?? {};
  const list: ReferenceEvidence[] = [];
  const notices: Notice[] = [];
  let clean: RegionMean | null = null;
  let white: RegionMean | null = null;
  if (marked.clean) {
    clean = read(pixels, marked.clean, 'clean');
    if (clean.clippedShare > MOST_CLIPPED) {
      throw new SetupError(
        'The clean surface is clipped (too bright for the photo); mark a darker patch of it, or take the photo with less exposure.',
      );
    }
    list.push(evidence('clean', clean, pixels.maxCode, null));
  }
  if (marked.white) {
    white = read(pixels, marked.white, 'card');
    if (white.clippedShare > MOST_CLIPPED) {
      throw new SetupError(
        'The card is clipped: it is too bright beside a film that reflects a few per cent. Use a dark grey card, or mark clean surface instead.',
      );
    }
    list.push(evidence('card', white, pixels.maxCode, marked.whiteReflectance ?? null));
  }
  if (marked.dark) list.push(evidence('dark', read(pixels, marked.dark, 'dark'), pixels.maxCode, null));
  return { evidence: list, clean, white, whiteReflectance: marked.whiteReflectance ?? null, notices };
}
