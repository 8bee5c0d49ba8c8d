/** What the page asks of the worker that does the heavy work on records: packing maps, hashing, gridding, ZIPs. */
import type { ThicknessMap } from '../match/types.ts';
import type { Observation } from '../record/observation.ts';

export const MAP_LAYERS = ['thicknessNm', 'lowNm', 'highNm', 'order', 'status'] as const;
export type MapLayer = (typeof MAP_LAYERS)[number];

/** What both sides need of a Blob, which this file's world does not know. */
export interface FileBytes {
  readonly type: string;
  readonly size: number;
  arrayBuffer(): Promise<ArrayBuffer>;
}

/** Every hand-over file that the worker writes. */
export type ExportKind = 'zip' | 'csv' | 'rows' | 'geojson' | 'geotiff';

export interface HandOverChoice {
  readonly id: string;
  readonly withoutPosition: boolean;
  /** Together with the position left out: keep the original although its own data may tell the place. */
  readonly keepOriginal: boolean;
}

export interface WrittenFile {
  readonly blob: FileBytes;
  readonly name: string;
  /** What the person must know before handing it over. */
  readonly notices: readonly string[];
}

export interface KeptRecord {
  readonly observation: Observation;
  /** Null where it is safe in storage; else why not. It then lives in memory until the page closes, and can be exported. */
  readonly problem: string | null;
}

export interface RecordJobs {
  /** A piece of a layer of the map that `keep` will use: pieces, so that copying one never holds the page up. */
  readonly layer: {
    readonly in: {
      readonly role: MapLayer;
      /** Pixels of the whole layer, and the first one of this piece. */
      readonly length: number;
      readonly from: number;
      readonly values: Float32Array | Uint8Array;
    };
    readonly out: null;
  };
  readonly keep: {
    readonly in: {
      readonly observation: Observation;
      readonly original: FileBytes | null;
      readonly thumbnail: FileBytes | null;
      readonly map: { readonly width: number; readonly height: number } | null;
    };
    readonly out: KeptRecord;
  };
  /** New words for a record whose files stay. */
  readonly revise: { readonly in: Observation; readonly out: KeptRecord };
  /** Keeps once more what could not be kept. */
  readonly retry: { readonly in: { readonly id: string }; readonly out: KeptRecord };
  /** Records that could not be kept and live in memory only. */
  readonly unkept: { readonly in: null; readonly out: readonly Observation[] };
  readonly open: { readonly in: { readonly id: string }; readonly out: KeptRecord };
  /** The map's picture with the thickness at the light end of its ramp; null where there is no map. */
  readonly picture: {
    readonly in: { readonly id: string };
    readonly out: { readonly png: Uint8Array; readonly topNm: number } | null;
  };
  readonly original: { readonly in: { readonly id: string }; readonly out: Uint8Array | null };
  /** The map itself, for a picture at its full size. */
  readonly map: { readonly in: { readonly id: string }; readonly out: ThicknessMap | null };
  readonly write: { readonly in: HandOverChoice & { readonly kind: ExportKind }; readonly out: WrittenFile };
  /** Keeps what a ZIP holds. @throws RecordError with what to do */
  readonly import: { readonly in: { readonly file: FileBytes }; readonly out: KeptRecord };
}
