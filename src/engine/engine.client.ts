import type { Light } from '../colour/types.ts';
import type { ThicknessMap } from '../match/types.ts';
import type { FourCorners } from '../photo/targetColours.ts';
import type { ChartView, EstimateResult, Job, OnProgress, OpenedPhoto, Probe } from './contract.ts';
import type { TargetReading } from './measureTarget.ts';
import type { Setup } from './setup.ts';
import type { TallyReport, TallyRequest } from './tallyContract.ts';

/** The face the page sees. One photo is open at a time; a second `openPhoto` replaces the first. */
export interface Engine {
  openPhoto(file: Blob, fileName: string, onProgress?: OnProgress): Job<OpenedPhoto>;
  estimate(setup: Setup, onProgress?: OnProgress): Job<EstimateResult>;
  /**
   * After `estimate`, within a second: a coarse map with other pins, trend, region or strokes, the camera fit kept. Its
   * pixels lie evenly over the photo. Resolves null where the fit does not serve that set-up: measure anew.
   */
  preview(setup: Setup): Promise<ThicknessMap | null>;
  /** After `estimate`; x, y in pixels of the opened photo. Resolves null outside the photo. */
  probe(x: number, y: number): Promise<Probe | null>;
  /**
   * After `estimate`: how much there is on its map. Cheap enough to ask again with every change of height, wind or shares.
   * Resolves null where there is no map (none measured, or the last measurement was cancelled).
   */
  tally(request?: TallyRequest): Job<TallyReport | null>;
  /** Fits the camera to a colour target on the open photo; see `measureTarget`. */
  target(corners: FourCorners, light: Light | undefined): Job<TargetReading>;
  chart(setup: Setup, maxThicknessNm: number): Job<ChartView>;
  dispose(): void;
}
