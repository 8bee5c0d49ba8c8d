/** The hand-over files of one observation, from what it holds. Pure: the worker and the tests call the same. */

import type { ThicknessMap } from '../match/types.ts';
import type { ArchiveContent } from '../record/archive.ts';
import type { Observation } from '../record/observation.ts';
import { RecordError } from '../record/readObservation.ts';
import { mapOf } from '../record/recordFiles.ts';
import { ROW_PROFILE_HEADER, rowProfile } from '../record/rowProfile.ts';
import { type Ground, type GroundFacts, groundOf, groundTiff, slickGeoJson } from './groundFiles.ts';

const NO_MAP = 'This record holds no map: measure its photo, then save the record again.';
const NO_VIEW =
  'The photo has no scale: give the height of the camera and the horizon in the View step, measure, and save the record again.';

/** File name for an export: letters, digits and dashes of the title. */
export function fileStem({ title }: Pick<Observation, 'title'>): string {
  const plain = title
    .normalize('NFD')
    .replace(/\p{M}/gu, '')
    .replace(/[^\p{L}\p{N}]+/gu, '-')
    .replace(/^-+|-+$/g, '')
    .slice(0, 60);
  return plain || 'record';
}

/** Thickness by row (RFC 4180). @throws RecordError without a map */
export function rowsCsv({ observation, files }: ArchiveContent): string {
  const map = mapIn({ observation, files });
  const lineOf = rowProfile(map);
  const lines = [ROW_PROFILE_HEADER];
  for (let y = 0; y < map.height; y++) {
    const line = lineOf(y);
    if (line) lines.push(line);
  }
  return `${lines.join('\r\n')}\r\n`;
}

/** The map, unpacked once for all exports of one content. @throws RecordError without a map */
function mapIn(content: ArchiveContent): ThicknessMap {
  const map = unpacked.get(content.observation.files) ?? mapOf(content.observation.files, content.files);
  if (!map) throw new RecordError(NO_MAP);
  unpacked.set(content.observation.files, map);
  return map;
}
const unpacked = new WeakMap<Observation['files'], ThicknessMap>();

/** The map on the water, worked out once for outlines and grid. @throws RecordError where the photo has no scale */
function groundIn(content: ArchiveContent): { readonly facts: GroundFacts; readonly ground: Ground } {
  const before = laidOut.get(content);
  if (before) return before;
  const facts = factsOf(content);
  const ground = groundOf(facts);
  if (!ground) throw new RecordError(NO_VIEW);
  laidOut.set(content, { facts, ground });
  return { facts, ground };
}
const laidOut = new WeakMap<ArchiveContent, { readonly facts: GroundFacts; readonly ground: Ground }>();

function factsOf(content: ArchiveContent): GroundFacts {
  const { observation } = content;
  const map = mapIn(content);
  if (!observation.setup) throw new RecordError(NO_MAP);
  const { position, viewpoint, photo, setup } = observation;
  const { headingDeg, headingReference } = viewpoint;
  return {
    map,
    setup,
    focalLength35mm: photo?.metadata.focalLength35mm,
    position,
    // A magnetic heading would turn the slick by the local declination, which nobody here knows.
    headingDeg: headingDeg && headingReference === 'true' ? headingDeg.value : null,
  };
}

/** Outlines as GeoJSON. @throws RecordError where the photo has no scale */
export function recordGeoJson(content: ArchiveContent): string {
  const { facts, ground } = groundIn(content);
  const { id, time, madeWith } = content.observation;
  return slickGeoJson(facts, ground, {
    record: id,
    utc: time?.utc ?? null,
    madeWith: `Tintfathom ${madeWith.app}`,
    indicative: true,
  });
}

/** Thickness on the ground as GeoTIFF. @throws RecordError where the photo has no scale */
export function recordGeoTiff(content: ArchiveContent): Uint8Array {
  const { facts, ground } = groundIn(content);
  const tiff = groundTiff(facts, ground);
  if (!tiff) throw new RecordError(NO_VIEW);
  return tiff;
}
