/** What the page asks of its workers, and what comes back. Data only: no functions cross the boundary. */
import type { Reading, ThicknessMap } from '../match/types.ts';
import type { PhotoMetadata } from '../photo/types.ts';
import type { FittedCamera } from './keptCamera.ts';

/** A running request. Exactly one of result or failure settles `promise`; after `cancel` it rejects with `Cancelled`. */
export interface Job<T> {
  readonly promise: Promise<T>;
  readonly cancel: () => void;
}

/** Share done in 0..1 with a few words ("matching colours"), at least every 250 ms while running. */
export type OnProgress = (share: number, step: string) => void;

export class Cancelled extends Error {
  override readonly name = 'Cancelled';
}

/** A notice a person should read; `code` is stable for scripts, `text` is a sentence that says what to do. */
export interface Notice {
  readonly code: string;
  readonly text: string;
}

export interface OpenedPhoto {
  /** Upright size of the pixels being measured. */
  readonly width: number;
  readonly height: number;
  /** Measured width / original width; below 1 where the photo was shrunk on opening. */
  readonly scale: number;
  readonly metadata: PhotoMetadata;
  readonly notices: readonly string[];
}

/** One fitted quantity of the camera: its value and one standard deviation. */
export interface FittedParameter {
  readonly name: string;
  readonly value: number;
  readonly sd: number;
  readonly priorSd: number;
}

export interface FitReport {
  /** 'well': the film's colours determine the camera; 'partly': priors matter; 'no': fell back to the nominal camera. */
  readonly determined: 'well' | 'partly' | 'no';
  /** Thicknesses that the sampled film colours span. */
  readonly spanNm: readonly [number, number];
  /** Root mean square residual of film pixels, in codes of 255. */
  readonly residualCodes: number;
  readonly parameters: readonly FittedParameter[];
  /** A plain sentence on how well the photo calibrates its own camera, and which reference would help. */
  readonly advice: string;
}

export interface EstimateSummary {
  readonly calibrated: boolean;
  readonly counts: {
    readonly total: number;
    readonly inRegion: number;
    readonly measured: number;
    readonly bare: number;
    readonly ambiguous: number;
    readonly atLeast: number;
    readonly noFilmColour: number;
  };
  /** Of pixels with a thickness (measured, ambiguous, bare); null where there are none. */
  readonly quantilesNm: Readonly<Record<'p05' | 'p25' | 'p50' | 'p75' | 'p95', number>> | null;
  /** Thicknesses over which this set-up can tell to the stated width; past `toNm` only a lower bound. */
  readonly resolvableNm: { readonly fromNm: number; readonly toNm: number };
  readonly fit: FitReport | null;
  readonly notices: readonly Notice[];
  readonly timingsMs: Readonly<Record<string, number>>;
}

export interface EstimateResult {
  readonly map: ThicknessMap;
  readonly summary: EstimateSummary;
  /** The camera that the film's colours told, ready to be kept by name; null where they told too little. */
  readonly camera: FittedCamera | null;
}

/** Everything the probe shows at one place. */
export interface Probe {
  readonly x: number;
  readonly y: number;
  /** Code values 0..255 seen at the pixel, and of the chart at the chosen thickness. */
  readonly seen: readonly [number, number, number];
  readonly matched: readonly [number, number, number] | null;
  /** Posterior density over thickness, before and after neighbours are heard (equal where no order step ran). */
  readonly thicknessNm: Float32Array;
  readonly posteriorAlone: Float32Array;
  readonly posteriorWithNeighbours: Float32Array;
  /** Thicknesses where one interference order ends and the next begins. */
  readonly orderBoundariesNm: readonly number[];
  readonly readings: readonly Reading[];
  /** What the map says here. */
  readonly status: number;
  readonly mapThicknessNm: number;
  readonly mapLowNm: number;
  readonly mapHighNm: number;
}

/** The chart for a set-up, ready to draw: index i is thickness i * stepNm. */
export interface ChartView {
  readonly stepNm: number;
  readonly count: number;
  /** Encoded sRGB bytes for display, 3 a thickness, exposed so that the brightest film fits. */
  readonly displayRgb: Uint8Array;
  /** XYZ (white Y = 1) and CIELAB, 3 a thickness. */
  readonly xyz: Float32Array;
  readonly lab: Float32Array;
  readonly linearRgb: Float32Array;
  /** Colour difference (CIEDE2000) per nanometre. */
  readonly sensitivityPerNm: Float32Array;
  readonly orderBoundariesNm: readonly number[];
  readonly resolvableNm: { readonly fromNm: number; readonly toNm: number };
  /** Pairs of thicknesses in different orders whose colours are closer than the stated noise. */
  readonly lookAlikes: readonly { readonly aNm: number; readonly bNm: number; readonly deltaE: number }[];
}
