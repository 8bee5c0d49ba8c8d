/**
 * One observation: what was photographed, by whom and from where, how it was read, what came out, and what was not known.
 * It is JSON all through; bulky parts (the original photo, maps) are files named by path and SHA-256.
 */
import type { EstimateSummary, Notice } from '../engine/contract.ts';
import type { Setup } from '../engine/setup.ts';
import type { PhotoMetadata } from '../photo/types.ts';
import type { AppearanceShares, VolumeByCode } from '../tally/appearanceCode.ts';
import type { MethodComparison } from '../tally/compareMethods.ts';
import type { DrainageLawId } from '../tally/drainageLaw.ts';
import type { Answer, LookAlikeQuestionId, LookAlikeResult } from '../tally/lookAlikes.ts';
import type { OiledArea } from '../tally/oiledArea.ts';
import type { VolumeByThickness } from '../tally/volumeByThickness.ts';

export const OBSERVATION_KIND = 'tintfathom/observation';
/** Goes up by one with every change of the fields; `readObservation` lifts older ones. */
export const SCHEMA_VERSION = 1;

/** Where a figure came from, so that a reader can weigh it. */
export type Source = 'exif' | 'geolocation' | 'sensor' | 'device' | 'typed' | 'computed' | 'photo';

export interface ObservedTime {
  /** ISO 8601 with Z; null where the offset of the clock is not known. */
  readonly utc: string | null;
  /** As the source gave it, in ISO 8601. */
  readonly recorded: string;
  /** "Z" or "+02:00"; null where nobody said. */
  readonly offset: string | null;
  readonly source: Source;
  readonly offsetSource: Source | null;
}

/** WGS 84. */
export interface ObservedPosition {
  readonly latitudeDeg: number;
  readonly longitudeDeg: number;
  readonly errorM?: number;
  readonly source: Source;
}

export interface Sourced<T> {
  readonly value: T;
  readonly source: Source;
}

export type ViewpointKind = 'aircraft' | 'drone' | 'vessel' | 'shore' | 'bench' | 'unknown';

export interface Viewpoint {
  readonly from: ViewpointKind;
  /** Height of the lens above the water, metres. */
  readonly heightM?: Sourced<number>;
  /** Bearing of the camera's axis, degrees clockwise from the north named. */
  readonly headingDeg?: Sourced<number>;
  readonly headingReference?: 'true' | 'magnetic';
  /** Of the camera's axis above the horizontal; roll positive where the right side dips. */
  readonly pitchDeg?: Sourced<number>;
  readonly rollDeg?: Sourced<number>;
  readonly focalLength35mm?: Sourced<number>;
}

export type Sky = 'clear' | 'partlyCloudy' | 'overcast' | 'fog' | 'rain' | 'night';

export interface Conditions {
  readonly windMS?: number;
  /** Where the wind comes from, degrees clockwise from true north. */
  readonly windFromDeg?: number;
  /** Degree of the sea, World Meteorological Organization code table 3700. */
  readonly seaState?: 0 | 1 | 2 | 3 | 4 | 5 | 6 | 7 | 8 | 9;
  readonly waveHeightM?: number;
  readonly sky?: Sky;
  readonly sun?: Sourced<{ readonly elevationDeg: number; readonly azimuthDeg: number }>;
  readonly visibilityKm?: number;
  readonly airTemperatureC?: number;
  readonly waterTemperatureC?: number;
  readonly polariser?: 'on' | 'off';
  /** Colour, depth, foam, weed, ice: in words. */
  readonly waterRemarks?: string;
}

export interface Substance {
  readonly name: string;
  /** "told by the master", "label of the drum". */
  readonly howKnown?: string;
}

/** What an observer without a photo (or beside one) measured or guessed. */
export interface SlickByEye {
  readonly lengthM?: number;
  readonly widthM?: number;
  /** 0 to 1. */
  readonly coverage?: number;
  readonly shares?: AppearanceShares;
  /** Streamers, windrows, patches: in words. */
  readonly structure?: string;
  readonly driftRemarks?: string;
  readonly sourceRemarks?: string;
}

export interface RecordedLookAlikes {
  readonly answers: Readonly<Partial<Record<LookAlikeQuestionId, Answer>>>;
  readonly conclusion: LookAlikeResult['conclusion'];
  readonly reason: string;
}

/** Areas without the histogram; shares are null where nothing gave an answer. */
export type RecordedArea = Omit<OiledArea, 'histogram' | 'coverage' | 'coverageLeast' | 'coverageMost'> & {
  readonly coverage: number | null;
  readonly coverageLeast: number | null;
  readonly coverageMost: number | null;
};

export type RecordedVolume = Omit<VolumeByThickness, 'meanThicknessNm'> & {
  readonly meanThicknessNm: number | null;
};

/** The standard deviation is null where the readings do not determine the parameter. */
export interface RecordedDrainage {
  readonly law: DrainageLawId;
  readonly parameters: readonly {
    readonly name: string;
    readonly unit: string;
    readonly value: number;
    readonly sd: number | null;
  }[];
  readonly rootMeanSquareNm: number;
  readonly birgeRatio: number | null;
  readonly degreesOfFreedom: number;
}

export interface RecordedResult {
  readonly summary: EstimateSummary | null;
  readonly area: RecordedArea | null;
  readonly byThickness: RecordedVolume | null;
  readonly byCode: VolumeByCode | null;
  readonly reasons: MethodComparison['reasons'];
  readonly drainage: readonly RecordedDrainage[];
  readonly notices: readonly Notice[];
}

/** What a file is to the observation. Roles that hold a position are named in `redact.ts`. */
export const FILE_ROLES = [
  'original',
  'thicknessNm',
  'lowNm',
  'highNm',
  'order',
  'status',
  'mapPicture',
  'thumbnail',
  'groundThicknessNm',
  'outlines',
  'profile',
] as const;
export type FileRole = (typeof FILE_ROLES)[number];

export interface RecordedFile {
  /** Inside the archive: "original/IMG_1.jpg", "results/thickness_nm.tif". */
  readonly path: string;
  readonly role: FileRole;
  readonly mediaType: string;
  readonly byteLength: number;
  /** Lower-case hexadecimal. */
  readonly sha256: string;
}

export interface RecordedPhoto {
  /** What the original says of itself, with its SHA-256: this stays where the original itself is left out. */
  readonly metadata: PhotoMetadata;
  /** Upright size of the pixels that were measured. */
  readonly measuredWidth: number;
  readonly measuredHeight: number;
}

/** What the user had left out before handing over. */
export type LeftOut = 'position' | 'original';

export interface Observation {
  readonly kind: typeof OBSERVATION_KIND;
  readonly schemaVersion: typeof SCHEMA_VERSION;
  readonly id: string;
  readonly title: string;
  /** ISO 8601 with Z. */
  readonly createdUtc: string;
  readonly changedUtc: string;
  readonly madeWith: { readonly app: string; readonly model: string };
  readonly observer: {
    readonly role?: string;
    readonly organisation?: string;
    readonly platform?: string;
    readonly incident?: string;
  };
  readonly time: ObservedTime | null;
  readonly position: ObservedPosition | null;
  readonly placeName?: string;
  readonly viewpoint: Viewpoint;
  readonly conditions: Conditions;
  readonly substance: Substance | null;
  readonly slickByEye: SlickByEye | null;
  readonly lookAlikes: RecordedLookAlikes | null;
  readonly photo: RecordedPhoto | null;
  /** Film, light, references, pins and region as they were read with. */
  readonly setup: Setup | null;
  readonly result: RecordedResult | null;
  readonly toldTo: readonly { readonly who: string; readonly utc?: string; readonly reference?: string }[];
  readonly remarks: string;
  /** Sentences from `notKnown`, as they stood when the observation was saved. */
  readonly notKnown: readonly string[];
  readonly leftOut: readonly LeftOut[];
  readonly files: readonly RecordedFile[];
}

/** The observation's files by path; bytes as they were, never re-encoded. */
export type RecordFiles = ReadonlyMap<string, Uint8Array>;

/** Lower-case hexadecimal SHA-256 of bytes; the caller's world has it (Web Crypto, Node). */
export type Sha256 = (bytes: Uint8Array) => Promise<string>;
