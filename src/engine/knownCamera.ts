import { atNextPhoto, type CameraKnowledge, conflictWith } from '../match/cameraKnowledge.ts';
import type { CameraModel } from '../match/cameraModel.ts';
import type { CameraFit } from '../match/fitCamera.ts';
import type { Notice } from './contract.ts';
import { knowledgeOf } from './keptCamera.ts';
import type { Setup } from './setup.ts';

/**
 * A kept camera that would agree with this photo less often than this, were it the same phone, is put aside. Covariances
 * are wide on purpose, so the same phone is refused more rarely than that.
 */
const LEAST_PROBABILITY = 0.01;

/** What the set-up's kept camera says of this photo's camera; null where there is none, or none that fits the file. */
export function knownCamera(
  setup: Setup,
  { encoding, matrixFor }: Pick<CameraModel, 'encoding' | 'matrixFor'>,
  notices: Notice[],
): CameraKnowledge | null {
  const kept = typeof setup.camera === 'object' && setup.camera.fit ? setup.camera.kept : undefined;
  if (!kept) return null;
  if (kept.encoding !== encoding.id) {
    notices.push({
      code: 'kept-camera-colours',
      text: `The kept camera “${kept.name}” wrote other colours (${kept.encoding}) than this photo (${encoding.id}), so it was put aside. Keep the camera anew from a photo like this one.`,
    });
    return null;
  }
  const known = knowledgeOf(kept);
  return atNextPhoto(known, matrixFor(known.mean.subarray(0, 9)));
}

/** What the set-up's kept camera is called; empty where there is none. */
export function keptName({ camera }: Setup): string {
  return typeof camera === 'object' ? (camera.kept?.name ?? '') : '';
}

/** Whether a fit with a kept camera as its prior says that it is another camera; then the notice says so. */
export function isOtherCamera(
  setup: Setup,
  known: CameraKnowledge,
  fit: CameraFit,
  notices: Notice[],
): boolean {
  const { probability } = conflictWith(known, fit);

  if (probability >= LEAST_PROBABILITY) return false;
  const name = keptName(setup);
  notices.push({
    code: 'kept-camera-conflict',
    text: `This photo does not look as if the kept camera “${name}” took it, so it was put aside. Check the phone, the lens and the light, or choose another kept camera.`,
  });
  return true;
}
