import type { ChartView, EstimateResult, Job, OnProgress, OpenedPhoto, Probe } from './contract.ts';
import type { Setup } from './setup.ts';

/** The face the page sees. One photo is open at a time; a second `openPhoto` replaces the first. */
export interface Engine {
  openPhoto(file: Blob, fileName: string, onProgress?: OnProgress): Job<OpenedPhoto>;
  estimate(setup: Setup, onProgress?: OnProgress): Job<EstimateResult>;
  /** After `estimate`; x, y in pixels of the opened photo. Resolves null outside the photo. */
  probe(x: number, y: number): Promise<Probe | null>;
  chart(setup: Setup, maxThicknessNm: number): Job<ChartView>;
  dispose(): void;
}
