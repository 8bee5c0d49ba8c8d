import type { FilmStack } from '../optics/types.ts';
import { type ConditionOptions, cameraOf, drawConditions, type EarlyDraws } from './conditions.ts';
import type { ThicknessField } from './fields/thicknessField.ts';
import { type Random, seededRandom } from './random.ts';
import type { SceneCamera } from './sceneCamera.ts';

/** What makes two scenes photos of one phone, and a scene a photo of less film. */
export interface PhoneRequest {
  /** Scenes with the same phone have the same sensor, tone curve and surfaces behind their colour matrix. */
  readonly phone?: number | string;
  /** Thicknesses are squeezed into this range, nm; bare surface stays bare. */
  readonly spanNm?: readonly [number, number];
}

/** Draws a camera, a light and a film index; where a phone is named, the camera is that phone's. */
export function drawPhone(
  random: Random,
  stack: FilmStack,
  incidenceDeg: number,
  request: PhoneRequest & { readonly conditions: ConditionOptions; readonly seed: number | string },
): { readonly drawn: EarlyDraws; readonly camera: SceneCamera } {
  const scene = drawConditions(
    random.fork('conditions'),
    stack,
    incidenceDeg,
    request.conditions,
    request.seed,
  );
  if (request.phone === undefined) return { drawn: scene, camera: cameraOf(scene, random) };
  const own = seededRandom(`phone/${request.phone}`);
  const phone = drawConditions(
    own.fork('conditions'),
    stack,
    incidenceDeg,
    request.conditions,
    request.phone,
  );
  const drawn = {
    ...scene,
    sensor: phone.sensor,
    coefficients: phone.coefficients,
    tone: phone.tone,
  };
  return { drawn, camera: cameraOf(drawn, own) };
}

/** A field of thicknesses up to `maxNm`, squeezed into a range. */
export function squeezed(
  field: ThicknessField,
  maxNm: number,
  spanNm: readonly [number, number] | undefined,
): ThicknessField {
  if (!spanNm) return field;
  const [from, to] = spanNm;
  return (x, y) => {
    const nm = field(x, y);
    return nm === 0 ? 0 : from + ((to - from) * nm) / maxNm;
  };
}
