import packageJson from '../../package.json' with { type: 'json' };
import type { EstimateResult } from '../engine/contract.ts';
import type { Setup } from '../engine/setup.ts';
import type { DecodedPhoto } from '../photo/types.ts';
import { encodeByteTiff, encodeFloatTiff } from '../record/floatTiff.ts';
import { encodeRgbPng } from '../record/png.ts';
import { paintMap } from '../record/thicknessColours.ts';

/** Files of one estimate, by name. */
export function* resultFiles(
  photo: DecodedPhoto,
  setup: Setup,
  { map, summary }: EstimateResult,
  moreTimingsMs: Readonly<Record<string, number>>,
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
  yield ['summary.json', `${JSON.stringify(report, null, 2)}\n`];
}
