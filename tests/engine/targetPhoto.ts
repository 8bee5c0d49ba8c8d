/** A photo of a colour target through a camera drawn at random, for tests. */
import sharp from 'sharp';
import { SRGB } from '../../src/colour/rgb.ts';
import { FILM_WAVELENGTHS_NM } from '../../src/colour/sampled.ts';
import { TARGET_COLUMNS, TARGET_ROWS, targetReflectances } from '../../src/colour/targetPatches.ts';
import { squareTo } from '../../src/photo/homography.ts';
import type { FourCorners } from '../../src/photo/targetColours.ts';
import type { PhotoPixels } from '../../src/photo/types.ts';
import { rawResponses } from '../../src/scene/cameraMatrix.ts';
import { developPhoto } from '../../src/scene/develop.ts';
import { type Random, seededRandom } from '../../src/scene/random.ts';
import type { SceneCamera } from '../../src/scene/sceneCamera.ts';
import type { ToneCurve } from '../../src/scene/toneCurve.ts';

export interface TargetScene {
  readonly camera: SceneCamera;
  readonly tone: ToneCurve;
  readonly seed: string;
  /** White balance error, a factor a channel. */
  readonly gains: readonly [number, number, number];
  /** ln light across the target, per side. */
  readonly slope?: readonly [number, number];
  readonly exposure?: number;
}

const WIDTH = 480;
const HEIGHT = 360;
/** Outer corners of the patches: a little askew, seen at a slant. */
export const CORNERS: FourCorners = [
  [62, 51],
  [419, 74],
  [402, 301],
  [48, 289],
];
const GAP = 0.15;

/** The target's spectra with what one target differs from another: 3 % in level and a tilt of 4 % over the spectrum. */
function otherTarget(random: Random): Float64Array {
  const spectra = targetReflectances(FILM_WAVELENGTHS_NM);
  const n = FILM_WAVELENGTHS_NM.length;
  for (let row = 0; row < TARGET_COLUMNS * TARGET_ROWS; row++) {
    const level = 1 + 0.03 * random.normal();
    const tilt = 0.04 * random.normal();
    for (let i = 0; i < n; i++) spectra[row * n + i]! *= level * (1 + tilt * (i / n - 0.5));
  }
  return spectra;
}

export async function targetPhoto(scene: TargetScene): Promise<PhotoPixels> {
  const random = seededRandom(`target/${scene.seed}`);
  const patches = rawResponses(otherTarget(random.fork('spectra')), scene.camera.rawWeights);
  const raw = new Float32Array(3 * WIDTH * HEIGHT);
  const place = squareTo(CORNERS);
  // The reverse map by looking: every place of the target, densely, into the nearest pixel. First the black board.
  const board = (u: number, v: number, colour: readonly number[]) => {
    const [x, y] = place(u, v);
    if (x < 0 || y < 0 || x >= WIDTH || y >= HEIGHT) return;
    raw.set(colour, 3 * (Math.floor(y) * WIDTH + Math.floor(x)));
  };
  const [sx, sy] = scene.slope ?? [0, 0];
  raw.fill(0.18);
  const steps = 1400;
  const pitch = (share: number, count: number) => {
    const along = share * (count + (count - 1) * GAP);
    const k = Math.floor(along / (1 + GAP));
    return share >= 0 && share < 1 && along - k * (1 + GAP) <= 1 ? k : -1;
  };
  for (let a = -0.06 * steps; a < 1.06 * steps; a++) {
    for (let b = -0.06 * steps; b < 1.06 * steps; b++) {
      const [u, v] = [a / steps, b / steps];
      const column = pitch(u, TARGET_COLUMNS);
      const row = pitch(v, TARGET_ROWS);
      const light = Math.exp(sx * (u - 0.5) + sy * (v - 0.5));
      const at = 3 * (row * TARGET_COLUMNS + column);
      board(
        u,
        v,
        row < 0 || column < 0 ? [0.03, 0.03, 0.03] : [0, 1, 2].map((c) => light * patches[at + c]!),
      );
    }
  }
  const matrix = scene.camera.matrix.map((v, k) => v * scene.gains[Math.floor(k / 3)]!);
  const codes = developPhoto(
    raw,
    {
      matrix,
      exposure: scene.exposure ?? 0.82,
      veil: [0.004, 0.004, 0.005],
      tone: scene.tone,
      noiseCodes: 2,
    },
    random.fork('noise'),
  );
  const jpeg = await sharp(Buffer.from(codes), { raw: { width: WIDTH, height: HEIGHT, channels: 3 } })
    .jpeg({ quality: 90, chromaSubsampling: '4:2:0' })
    .toBuffer();
  const read = new Uint8Array(await sharp(jpeg).raw().toBuffer());
  return { width: WIDTH, height: HEIGHT, codes: read, channels: 3, maxCode: 255, encoding: SRGB };
}
