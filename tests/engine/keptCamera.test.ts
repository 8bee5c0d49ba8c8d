import sharp from 'sharp';
import { beforeAll, describe, expect, it } from 'vitest';
import { SRGB } from '../../src/colour/rgb.ts';
import type { EstimateResult } from '../../src/engine/contract.ts';
import { estimate } from '../../src/engine/estimate.ts';
import { cameraNameFrom, type KeptCamera, nameCamera } from '../../src/engine/keptCamera.ts';
import { readKeptCamera } from '../../src/engine/keptCameraSchema.ts';
import { measureTarget } from '../../src/engine/measureTarget.ts';
import { parseSetup } from '../../src/engine/parseSetup.ts';
import type { Setup } from '../../src/engine/setup.ts';
import { filmStackFor } from '../../src/optics/filmPresets.ts';
import type { PhotoPixels } from '../../src/photo/types.ts';
import { SCENES } from '../../src/scene/catalogue.ts';
import { CONDITIONS } from '../../src/scene/conditions.ts';
import { drawPhone } from '../../src/scene/phone.ts';
import { seededRandom } from '../../src/scene/random.ts';
import type { Scene } from '../../src/scene/types.ts';
import { CORNERS, targetPhoto } from './targetPhoto.ts';

const WIDTH = 320;
const HEIGHT = 240;
const DRAWS = 4;

interface Photo {
  readonly scene: Scene;
  readonly pixels: PhotoPixels;
}

async function soapPhoto(seed: string, phone: string, spanNm?: readonly [number, number]): Promise<Photo> {
  const scene = SCENES['soap-draining']({
    width: WIDTH,
    height: HEIGHT,
    seed,
    phone,
    conditions: CONDITIONS.stated,
    ...(spanNm ? { spanNm } : {}),
  });
  const jpeg = await sharp(Buffer.from(scene.codes), { raw: { width: WIDTH, height: HEIGHT, channels: 3 } })
    .jpeg({ quality: 90, chromaSubsampling: '4:2:0' })
    .toBuffer();
  const codes = new Uint8Array(await sharp(jpeg).raw().toBuffer());
  return {
    scene,
    pixels: { width: WIDTH, height: HEIGHT, codes, channels: 3, maxCode: 255, encoding: SRGB },
  };
}

function keep({ camera }: EstimateResult): KeptCamera {
  if (!camera) throw new Error('no camera to keep');
  // As a file: what is read back is what was written.
  const read = readKeptCamera(
    JSON.parse(JSON.stringify(nameCamera(camera, 'test phone', '2026-05-01T10:00:00Z'))),
  );
  if (!read) throw new Error('the camera does not read back');
  return read;
}

/** Errors of film pixels within the frame; no answer is infinitely far off. */
function errorsOf({ scene }: Photo, { map }: EstimateResult): number[] {
  const errors: number[] = [];
  for (let i = 0; i < map.status.length; i++) {
    if (scene.kind[i] !== 1 || map.status[i] === 0) continue;
    const gap = Math.abs(map.thicknessNm[i]! - scene.thicknessNm[i]!);
    errors.push(Number.isNaN(gap) ? Number.POSITIVE_INFINITY : gap);
  }
  return errors;
}

const figures = (errors: readonly number[]) => {
  const sorted = [...errors].sort((a, b) => a - b);
  return {
    median: sorted[sorted.length >> 1]!,
    p90: sorted[Math.floor(0.9 * sorted.length)]!,
    gross: errors.filter((e) => e > 20).length / errors.length,
  };
};
const codesOf = (result: EstimateResult) => result.summary.notices.map((notice) => notice.code);

const kept: KeptCamera[] = [];
const pooled = { without: [] as number[], own: [] as number[], other: [] as number[] };
let ownConflicts = 0;

beforeAll(async () => {
  for (let n = 1; n <= DRAWS; n++) {
    const first = await soapPhoto(`first${n}`, `${n}`);
    kept.push(keep(estimate(first.pixels, first.scene.setup)));
  }
  for (let n = 1; n <= DRAWS; n++) {
    // Only silver to the first colours, and nothing marked beside it.
    const next = await soapPhoto(`next${n}`, `${n}`, [80, 250]);
    const { references: _, ...setup } = next.scene.setup;
    const read = (camera: Setup['camera']) =>
      estimate(next.pixels, { ...setup, ...(camera ? { camera } : {}) });
    pooled.without.push(...errorsOf(next, read('phone')));
    const own = read({ fit: true, kept: kept[n - 1]! });
    const other = read({ fit: true, kept: kept[n % DRAWS]! });
    pooled.own.push(...errorsOf(next, own));
    pooled.other.push(...errorsOf(next, other));
    if (codesOf(own).includes('kept-camera-conflict')) ownConflicts++;
  }
}, 600_000);

describe('a camera kept from one photo, at the next photo of the same phone', () => {
  it('reads a film of few colours clearly better than without it', () => {
    const without = figures(pooled.without);
    const own = figures(pooled.own);
    if (process.env.PRINT_FIGURES) console.log({ without, own, other: figures(pooled.other), ownConflicts });
    expect(own.median).toBeLessThan(0.7 * without.median);
    expect(own.p90).toBeLessThan(0.7 * without.p90);
    expect(own.gross).toBeLessThanOrEqual(without.gross);
  });

  it('is not taken for another phone', () => expect(ownConflicts).toBe(0));

  it('of another phone does no harm to a film of few colours, noticed or not', () => {
    // So few colours seldom tell phones apart (about one in three here); cameras of the family are near enough.
    const without = figures(pooled.without);
    const other = figures(pooled.other);
    expect(other.median).toBeLessThan(1.5 * without.median);
    expect(other.p90).toBeLessThan(1.5 * without.p90);
  });

  it('of another phone is mostly noticed where the film shows all its colours, and does little harm where it is not', async () => {
    const whole = await soapPhoto('whole', '1');
    const plain = estimate(whole.pixels, whole.scene.setup);
    const others = kept
      .slice(1)
      .map((camera) => estimate(whole.pixels, { ...whole.scene.setup, camera: { fit: true, kept: camera } }));
    const noticed = others.map((other) => codesOf(other).includes('kept-camera-conflict'));
    if (process.env.PRINT_FIGURES)
      console.log({
        noticed,
        plain: figures(errorsOf(whole, plain)),
        others: others.map((o) => figures(errorsOf(whole, o))),
      });
    expect(noticed.filter((v) => v).length).toBeGreaterThanOrEqual(2);
    others.forEach((other, k) => {
      // Noticed, it is as if no camera had been named.
      if (noticed[k]) expect(other.map.thicknessNm).toEqual(plain.map.thicknessNm);
      else
        expect(figures(errorsOf(whole, other)).p90).toBeLessThan(1.5 * figures(errorsOf(whole, plain)).p90);
    });
  }, 300_000);

  it('is put aside, and says so, for a photo in another code space', async () => {
    const next = await soapPhoto('space', '1');
    const camera = { fit: true, kept: { ...kept[0]!, encoding: 'display-p3' } };
    expect(codesOf(estimate(next.pixels, { ...next.scene.setup, camera }))).toContain('kept-camera-colours');
  });
});

describe('a camera from a colour target, at a photo of the same phone', () => {
  it('reads a film of few colours clearly better than without it', async () => {
    const without: number[] = [];
    const withTarget: number[] = [];
    for (const phone of ['1', '2', '3']) {
      const request = { phone, seed: `target ${phone}`, conditions: CONDITIONS.stated };
      const { drawn, camera } = drawPhone(seededRandom(`target ${phone}`), filmStackFor('soap'), 0, request);
      const gains = [1.03, 0.98, 1.01] as const;
      const target = await targetPhoto({ camera, tone: drawn.tone, seed: phone, gains });
      const reading = measureTarget(target, CORNERS, { daylightK: drawn.toldDaylightK });
      const next = await soapPhoto(`next${phone}`, phone, [80, 250]);
      const { references: _, ...setup } = next.scene.setup;
      const found = nameCamera(reading.camera, 'target', '2026-05-01T10:00:00Z');
      without.push(...errorsOf(next, estimate(next.pixels, setup)));
      withTarget.push(
        ...errorsOf(next, estimate(next.pixels, { ...setup, camera: { fit: true, kept: found } })),
      );
    }
    if (process.env.PRINT_FIGURES) console.log(figures(without), figures(withTarget));
    expect(figures(withTarget).median).toBeLessThan(0.7 * figures(without).median);
    expect(figures(withTarget).p90).toBeLessThan(0.5 * figures(without).p90);
  }, 300_000);
});

describe('a kept camera as data', () => {
  it('is part of a set-up, and nothing else passes for one', () => {
    const setup = { film: 'soap', camera: { fit: true, kept: kept[0]! } };
    expect(parseSetup(JSON.parse(JSON.stringify(setup)))).toEqual(setup);
    const bad = (kept: unknown) => () => parseSetup({ film: 'soap', camera: { fit: true, kept } });
    expect(bad({ ...kept[0], mean: [1, 2] })).toThrow(/camera\.kept\.mean.*36 numbers/);
    expect(bad({ ...kept[0], lens: 'wide' })).toThrow(/no key "camera\.kept\.lens"/);
    expect(bad({ ...kept[0], covariance: kept[0]!.covariance.map((v) => -v) })).toThrow(/not a covariance/);
    expect(bad({ ...kept[0], version: 9 })).toThrow(/camera\.kept\.version/);
    expect(() => parseSetup({ film: 'soap', camera: { fit: false, kept: kept[0] } })).toThrow(/"fit": true/);
  });

  it('is named after make and model, the make said once', () => {
    expect(cameraNameFrom('Kestrel', 'Kestrel 4')).toBe('Kestrel 4');
    expect(cameraNameFrom('Kestrel', 'K-4')).toBe('Kestrel K-4');
    expect(cameraNameFrom(undefined, 'K-4')).toBe('K-4');
    expect(cameraNameFrom(undefined, undefined)).toBe('');
  });
});
