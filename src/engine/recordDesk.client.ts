import type { ThicknessMap } from '../match/types.ts';
import type { Observation } from '../record/observation.ts';
import { makeCaller } from './caller.client.ts';
import {
  type ExportKind,
  type HandOverChoice,
  type KeptRecord,
  MAP_LAYERS,
  type MapLayer,
  type RecordJobs,
} from './recordJobs.ts';

/** Records as the page sees them: everything heavy happens in a worker of its own. Failures are sentences. */
export interface RecordDesk {
  /** Keeps a new observation with its photo and its map, in place of one of the same id. */
  keep(given: {
    readonly observation: Observation;
    readonly original: Blob | null;
    readonly thumbnail: Blob | null;
    readonly map: ThicknessMap | null;
  }): Promise<KeptRecord>;
  revise(observation: Observation): Promise<KeptRecord>;
  /** Records that live in memory only, because the device had no room. */
  unkept(): Promise<readonly Observation[]>;
  retry(id: string): Promise<KeptRecord>;
  open(id: string): Promise<KeptRecord>;
  picture(id: string): Promise<{ readonly png: Blob; readonly topNm: number } | null>;
  original(id: string): Promise<Uint8Array | null>;
  map(id: string): Promise<ThicknessMap | null>;
  write(
    kind: ExportKind,
    choice: HandOverChoice,
  ): Promise<{ readonly blob: Blob; readonly name: string; readonly notices: readonly string[] }>;
  importZip(file: Blob): Promise<KeptRecord>;
}

/** Pixels copied at once: a few milliseconds' work on a phone. */
const PIECE = 1_000_000;

export function createRecordDesk(): RecordDesk {
  const worker = new Worker(new URL('./record.worker.ts', import.meta.url), {
    type: 'module',
    name: 'record',
  });
  const { call } = makeCaller<RecordJobs>(worker);
  const sendLayer = async (role: MapLayer, layer: Float32Array | Uint8Array) => {
    for (let from = 0; from < layer.length; from += PIECE) {
      // Copying takes the page's time, so each piece has a turn of its own.
      const values = layer.slice(from, from + PIECE);
      await call(
        'layer',
        { role, length: layer.length, from, values },
        { transfer: [values.buffer as ArrayBuffer] },
      );
    }
  };
  return {
    keep: async ({ map, ...rest }) => {
      for (const role of map ? MAP_LAYERS : []) {
        if (map) await sendLayer(role, map[role]);
      }
      return call('keep', { ...rest, map: map && { width: map.width, height: map.height } });
    },
    revise: (observation) => call('revise', observation),
    unkept: () => call('unkept', null),
    retry: (id) => call('retry', { id }),
    open: (id) => call('open', { id }),
    picture: async (id) => {
      const found = await call('picture', { id });
      const png = found && new Blob([found.png as Uint8Array<ArrayBuffer>], { type: 'image/png' });
      return png && { png, topNm: found.topNm };
    },
    original: (id) => call('original', { id }),
    map: (id) => call('map', { id }),
    write: async (kind, choice) => {
      const { blob, ...rest } = await call('write', { ...choice, kind });
      return { ...rest, blob: blob as Blob };
    },
    importZip: (file) => call('import', { file }),
  };
}
