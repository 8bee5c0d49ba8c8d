/** Keeps records and writes their hand-over files, away from the page. */
import { type ArchiveContent, readArchive, writeArchive } from '../record/archive.ts';
import { archiveExports } from '../record/archiveExports.ts';
import type { Observation } from '../record/observation.ts';
import { RecordError } from '../record/readObservation.ts';
import { mapOf, recordFiles } from '../record/recordFiles.ts';
import { withoutPosition } from '../record/redact.ts';
import { resultsCsv } from '../record/resultsCsv.ts';
import { webSha256 } from '../record/sha256.browser.ts';
import { openStore, type RecordStore } from '../record/store.browser.ts';
import { fileStem, recordGeoJson, recordGeoTiff, rowsCsv } from './recordExports.ts';
import type {
  ExportKind,
  FileBytes,
  HandOverChoice,
  KeptRecord,
  MapLayer,
  RecordJobs,
} from './recordJobs.ts';
import { pictureOf, topOf } from './recordPicture.ts';
import { buffersIn, serve } from './serve.worker.ts';

let layers: Partial<Record<MapLayer, Float32Array | Uint8Array>> = {};
/** What could not be kept: it lives here until the page closes. */
const unkept = new Map<string, ArchiveContent>();

let opened: Promise<RecordStore> | null = null;
function theStore(): Promise<RecordStore> {
  opened ??= openStore().catch((error: unknown) => {
    opened = null;
    throw error;
  });
  return opened;
}

async function bytesOf(blob: FileBytes): Promise<Uint8Array> {
  return new Uint8Array(await blob.arrayBuffer());
}

/** Keeps it; where that fails it stays in memory and the sentence says why. */
async function kept(content: ArchiveContent): Promise<KeptRecord> {
  const { observation } = content;
  try {
    await (await theStore()).save(content);
    unkept.delete(observation.id);
    return { observation, problem: null };
  } catch (error) {
    unkept.set(observation.id, content);
    return { observation, problem: error instanceof Error ? error.message : String(error) };
  }
}

async function contentOf(id: string): Promise<ArchiveContent> {
  return unkept.get(id) ?? (await theStore()).open(id);
}

/** Keeps what came in a ZIP, but never over a record of the same name that says something else. */
async function imported(content: ArchiveContent): Promise<KeptRecord> {
  const { observation } = content;
  const entries = await theStore().then(
    (store) => store.list(),
    () => [],
  );
  const here = entries.find(({ id }) => id === observation.id)?.observation;
  if (here && JSON.stringify(here) !== JSON.stringify(observation)) {
    throw new RecordError(
      `“${here.title}” is on this device already and was changed there: delete it, or hand it over as a ZIP first, then import again.`,
    );
  }
  return kept(content);
}

/** Only what the observation says, without reading its files. */
async function observationOf(id: string): Promise<Observation> {
  const inMemory = unkept.get(id)?.observation;
  if (inMemory) return inMemory;
  const entry = (await (await theStore()).list()).find((one) => one.id === id);
  if (!entry) throw new RecordError('This record is no longer on this device: import its ZIP.');
  if (!entry.observation) throw new RecordError(entry.problem);
  return entry.observation;
}

async function fileOf(id: string, role: 'original' | 'mapPicture'): Promise<Uint8Array | null> {
  const listed = (await observationOf(id)).files.find((file) => file.role === role);
  if (!listed) return null;
  // A copy: answers are handed over to the page, and what is not kept has only this one.
  return unkept.get(id)?.files.get(listed.path)?.slice() ?? (await theStore()).file(listed.sha256);
}

/** The map that came in layers; null unless all are there. */
function takeLayers(size: { readonly width: number; readonly height: number } | null) {
  const { thicknessNm, lowNm, highNm, order, status } = layers;
  layers = {};
  if (!size || !thicknessNm || !lowNm || !highNm || !order || !status) return null;
  return {
    ...size,
    thicknessNm: thicknessNm as Float32Array,
    lowNm: lowNm as Float32Array,
    highNm: highNm as Float32Array,
    order: order as Uint8Array,
    status: status as Uint8Array,
  };
}

async function chosen({ id, withoutPosition: leaves, keepOriginal }: HandOverChoice) {
  const content = await contentOf(id);
  if (!leaves) return { content, notices: [] };
  const { notices, ...redacted } = await withoutPosition(content, { keepOriginal, sha256: webSha256 });
  return { content: redacted, notices };
}

const EXPORTS: Readonly<
  Record<ExportKind, { readonly ending: string; readonly type: string; readonly make: Make }>
> = {
  zip: { ending: '.zip', type: 'application/zip', make: zip },
  csv: { ending: '-results.csv', type: 'text/csv', make: ({ observation }) => [resultsCsv(observation)] },
  rows: { ending: '-rows.csv', type: 'text/csv', make: (content) => [rowsCsv(content)] },
  geojson: { ending: '.geojson', type: 'application/geo+json', make: (content) => [recordGeoJson(content)] },
  geotiff: { ending: '-thickness.tif', type: 'image/tiff', make: (content) => [recordGeoTiff(content)] },
};
type Make = (content: ArchiveContent) => (string | Uint8Array)[] | Promise<(string | Uint8Array)[]>;

/** Everything, with what people and other programs read beside it. */
async function zip(content: ArchiveContent): Promise<Uint8Array[]> {
  const { observation, files } = content;
  const listed = observation.files.find(({ role }) => role === 'mapPicture');
  const png = listed && files.get(listed.path);
  const topNm = png ? topOf(png) : null;
  const picture = png && topNm ? { url: `data:image/png;base64,${base64(png)}`, topNm } : null;
  const exports = new Map<string, string | Uint8Array>(archiveExports(observation, { picture }));
  for (const [name, make] of [
    ['rows.csv', rowsCsv],
    ['observation.geojson', recordGeoJson],
    ['thickness_geo.tif', recordGeoTiff],
  ] as const) {
    try {
      exports.set(name, make(content));
    } catch (error) {
      // Without a map or a scale there is nothing of the kind; the rest is worth having.
      if (!(error instanceof RecordError)) throw error;
    }
  }
  return writeArchive(content, { sha256: webSha256, exports });
}

function base64(bytes: Uint8Array): string {
  let binary = '';
  for (let i = 0; i < bytes.length; i += 0x8000) {
    binary += String.fromCharCode(...bytes.subarray(i, i + 0x8000));
  }
  return btoa(binary);
}

serve<RecordJobs>(
  {
    layer: ({ role, length, from, values }) => {
      if (from === 0)
        layers[role] = values instanceof Float32Array ? new Float32Array(length) : new Uint8Array(length);
      layers[role]?.set(values, from);
      return null;
    },
    keep: async ({ observation, original, thumbnail, map: size }) => {
      const map = takeLayers(size);
      const more = [];
      if (map)
        more.push({
          path: 'results/map.png',
          role: 'mapPicture' as const,
          mediaType: 'image/png',
          bytes: pictureOf(map),
        });
      if (thumbnail)
        more.push({
          path: 'results/thumbnail.jpg',
          role: 'thumbnail' as const,
          mediaType: thumbnail.type,
          bytes: await bytesOf(thumbnail),
        });
      const fileName = observation.photo?.metadata.fileName ?? 'photo';
      const mediaType = observation.photo?.metadata.mimeType ?? 'application/octet-stream';
      const { listed, files } = await recordFiles(
        {
          ...(original && { original: { fileName, mediaType, bytes: await bytesOf(original) } }),
          ...(map && { map }),
          more,
        },
        webSha256,
      );
      return kept({ observation: { ...observation, files: listed }, files });
    },
    revise: async (observation) => {
      const before = unkept.get(observation.id);
      if (before) return kept({ observation, files: before.files });
      try {
        await (await theStore()).revise(observation);
        return { observation, problem: null };
      } catch (error) {
        if (!(error instanceof RecordError)) throw error;
        // The new words are not kept: they stay here with the files, so that a ZIP can still take them along.
        unkept.set(observation.id, {
          observation,
          files: (await (await theStore()).open(observation.id)).files,
        });
        return { observation, problem: error.message };
      }
    },
    unkept: () => [...unkept.values()].map(({ observation }) => observation),
    retry: async ({ id }) => kept(await contentOf(id)),
    open: async ({ id }) => ({
      observation: await observationOf(id),
      problem: unkept.has(id)
        ? 'This record is not kept on this device yet: save it as a ZIP, or try again.'
        : null,
    }),
    picture: async ({ id }) => {
      const png = await fileOf(id, 'mapPicture');
      const topNm = png && topOf(png);
      return png && topNm ? { png, topNm } : null;
    },
    original: ({ id }) => fileOf(id, 'original'),
    map: async ({ id }) => {
      const { observation, files } = await contentOf(id);
      return mapOf(observation.files, files);
    },
    write: async ({ kind, ...choice }) => {
      const { content, notices } = await chosen(choice);
      const { ending, type, make } = EXPORTS[kind];
      const parts = await make(content);
      const blob = new Blob(parts as BlobPart[], { type });
      return { blob, name: `${fileStem(content.observation)}${ending}`, notices };
    },
    import: async ({ file }) => imported(await readArchive(await bytesOf(file), webSha256)),
  },
  buffersIn,
);
