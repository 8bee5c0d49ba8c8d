import packageJson from '../../package.json' with { type: 'json' };
import { type GroundFacts, groundOf, groundTiff, slickGeoJson } from '../engine/groundFiles.ts';
import type { Setup } from '../engine/setup.ts';
import type { TallyReport } from '../engine/tallyContract.ts';
import type { ThicknessMap } from '../match/types.ts';
import type { PhotoMetadata } from '../photo/types.ts';
import { tallyCsv } from '../record/tallyCsv.ts';
import { APPEARANCE_CODE_VERSION } from '../tally/appearanceCode.ts';

/** Names of the files that need a view; they are not written without one. */
export const GROUND_FILES = ['thickness_geo.tif', 'observation.geojson'] as const;

/** Files of a tally, by name; those of `GROUND_FILES` only where the view is known. */
export function* tallyFiles(
  map: ThicknessMap,
  setup: Setup,
  metadata: PhotoMetadata,
  report: TallyReport,
): Generator<readonly [string, Uint8Array | string]> {
  yield ['tally.json', tallyJson(report, metadata)];
  yield ['tally.csv', tallyCsv(report)];
  const { position, headingDeg } = report;
  const facts: GroundFacts = { map, setup, focalLength35mm: metadata.focalLength35mm, position, headingDeg };
  const ground = groundOf(facts);
  if (!ground) return;
  const tiff = groundTiff(facts, ground);
  if (tiff) yield ['thickness_geo.tif', tiff];
  yield ['observation.geojson', slickGeoJson(facts, ground, commonProperties(report, metadata))];
}

/**
 * The report with its keys as in `engine/tallyContract.ts` (units in the names), and null for what is no number. Its
 * notices are all there once.
 */
export function tallyJson(report: TallyReport, metadata: PhotoMetadata): string {
  const { mapped, comparison, ...rest } = report;
  const written = {
    tintfathom: packageJson.version,
    photo: { fileName: metadata.fileName, sha256: metadata.sha256, takenAt: metadata.takenAt ?? null },
    appearanceCode: APPEARANCE_CODE_VERSION,
    indicative: 'Indicative only: the responsible authority decides.',
    ...rest,
    mapped: mapped && { codedM2: mapped.codedM2, belowM2: mapped.belowM2, atLeastM2: mapped.atLeastM2 },
    comparison,
    ground: groundSentence(report),
  };
  return `${JSON.stringify(written, plain, 2)}\n`;
}

/** Typed arrays as arrays, and null where JSON has no number. */
function plain(_: string, value: unknown): unknown {
  if (value instanceof Float64Array) return [...value];
  return typeof value === 'number' && !Number.isFinite(value) ? null : value;
}

/** What the two ground files hold, or why they do not. */
function groundSentence({ scale, position, headingDeg }: TallyReport): string {
  if (scale === 'pixels') {
    return 'No view is known, so there is no ground map and no outline: give "view" in the set-up.';
  }
  if (!position) {
    return 'No position is known or it was left out: the ground map is on a grid of its own in metres, and the outlines have no coordinates.';
  }
  return headingDeg === null
    ? 'No heading is known: the ground map is on a grid of its own in metres (y ahead of the camera), and the outlines have no coordinates.'
    : 'Placed by the camera’s position and heading: errors of both shift and turn the whole.';
}

function commonProperties(report: TallyReport, metadata: PhotoMetadata) {
  return {
    tintfathom: packageJson.version,
    photoFileName: metadata.fileName,
    photoSha256: metadata.sha256,
    takenAt: metadata.takenAt ?? null,
    indicative: true,
    ...(report.byThickness && {
      volumeLeastM3: report.byThickness.volumeM3.least,
      volumeMostM3: report.byThickness.volumeM3.most,
    }),
  };
}
