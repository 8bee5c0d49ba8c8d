import packageJson from '../../package.json' with { type: 'json' };
import type { EstimateResult } from '../engine/contract.ts';
import { cameraNameFrom, nameCamera } from '../engine/keptCamera.ts';
import type { Setup } from '../engine/setup.ts';
import type { DecodedPhoto } from '../photo/types.ts';
import { encodeByteTiff, encodeFloatTiff } from '../record/floatTiff.ts';
import { encodeRgbPng } from '../record/png.ts';
import { paintMap } from '../record/thicknessColours.ts';

/** Files of one estimate, by name. */
export function* resultFiles(
  photo: DecodedPhoto,
  setup: Setup,
  { map, summary, camera }: EstimateResult,
  moreTimingsMs: Readonly<Record<string, number>>,
  madeAt: string,
): Generator<readonly [string, Uint8Array | string]> {
  const { width, height } = map;
  yield ['thickness_nm.tif', encodeFloatTiff({ width, height, values: map.thicknessNm })];
  yield ['low_nm.tif', encodeFloatTiff({ width, height, values: map.lowNm })];
  yield ['high_nm.tif', encodeFloatTiff({ width, height, values: map.highNm })];
  yield ['order.tif', encodeByteTiff({ width, height, values: map.order })];
  yield ['map.png', encodeRgbPng({ width, height, rgb: paintMap(map).rgb })];
  const report = {
    tintfathom: packageJson.version,
    photo: photo.metadata,
    photoNotices: photo.notices,
    setup,
    ...summary,
    ambiguousShare: summary.counts.inRegion > 0 ? summary.counts.ambiguous / summary.counts.inRegion : 0,
    timingsMs: { ...moreTimingsMs, ...summary.timingsMs },
    indicative: 'Indicative only: the responsible authority decides.',
  };
  if (camera) {
    const { cameraMake: make, cameraModel: model } = photo.metadata;
    const kept = nameCamera(camera, cameraNameFrom(make, model) || 'camera', madeAt, { make, model });
    yield ['camera.json', `${JSON.stringify(kept)}\n`];
  }
  yield ['summary.json', `${JSON.stringify(report, null, 2)}\n`];
}
