import type { Setup } from '../engine/setup.ts';
import type { PinholeView } from './perspective.ts';
import type { ToneCurve } from './toneCurve.ts';

/** What is truly at a pixel. Stored as a byte in `Scene.kind`. */
export const TRUE_KIND = {
  /** Frame, cloth, card, quay, hull, glint, foam, debris. */
  other: 0,
  /** Film of the thickness in `Scene.thicknessNm`. */
  film: 1,
  /** Bare surface: thickness 0. */
  bare: 2,
  /** Film or bare water that mirrors something solid instead of the sky: its colour is not the sky's light. */
  mirrorsSolid: 3,
} as const;

/** Everything that was drawn at random and that the reader is not told. */
export interface DrawnConditions {
  readonly sensor: 'family' | 'outside' | 'measured';
  /** The camera's name where `sensor` is 'measured'. */
  readonly measuredSensor?: string;
  /** The nine family coefficients (r, g, b by three components); empty outside the family. */
  readonly coefficients: readonly number[];
  /** White balance error, one factor a channel, and the stage it acts at. */
  readonly gains: readonly [number, number, number];
  readonly gainStage: 'sensor' | 'output';
  /** Common factor that sets the exposure, on linear light. */
  readonly exposure: number;
  /** Added linear light a channel, after exposure. */
  readonly veil: readonly [number, number, number];
  readonly tone: ToneCurve;
  readonly daylightK: number;
  /** Film index minus the preset's, all wavelengths alike. */
  readonly indexError: number;
  /** n_D of the film as the preset says. */
  readonly presetIndex: number;
  /** Incidence in degrees at the middle of the film. */
  readonly incidenceDeg: number;
  readonly noiseCodes: number;
  readonly relativeThicknessSpread: number;
}

/** A rendered photo and all that is true of it. Row by row from the top left. */
export interface Scene {
  readonly name: string;
  readonly filmKind: 'soap' | 'oil';
  readonly width: number;
  readonly height: number;
  /** Interleaved 8-bit sRGB codes, 3 a pixel, before any JPEG. */
  readonly codes: Uint8Array;
  /** 0 on bare surface, NaN where there is neither film nor bare surface. */
  readonly thicknessNm: Float32Array;
  /** `TRUE_KIND` values. */
  readonly kind: Uint8Array;
  /** What the reader is told. */
  readonly setup: Setup;
  readonly drawn: DrawnConditions;
  /** True camera place, on scenes over level water. */
  readonly view?: PinholeView;
  /** Truth on the water seen within the region, on scenes over level water. */
  readonly water?: {
    readonly regionM2: number;
    readonly oiledM2: number;
    readonly volumeMl: number;
  };
}
