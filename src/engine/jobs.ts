/** The methods of the two kinds of worker, as types: what goes in, what comes out. */
import type { Light } from '../colour/types.ts';
import type { CodeChart } from '../match/codeChart.ts';
import type { MapRows, ReadingRules, SettledField } from '../match/mapPixels.ts';
import type { ThicknessMap } from '../match/types.ts';
import type { FourCorners } from '../photo/targetColours.ts';
import type { PhotoPixels } from '../photo/types.ts';
import type { ChartView, EstimateResult, OpenedPhoto, Probe } from './contract.ts';
import type { TargetReading } from './measureTarget.ts';
import type { SeenAngles } from './seenAngles.ts';
import type { Setup } from './setup.ts';
import type { TallyReport, TallyRequest } from './tallyContract.ts';

/** Pixels as they cross between threads: functions cannot, so the encoding stays behind (rows need none). */
export type RowPixels = Omit<PhotoPixels, 'encoding'>;

/** A band of the photo with all that reading it needs, self-contained: row 0 is the band's first row. */
export interface BandTask {
  readonly pixels: RowPixels;
  /** The photo's row of the band's first row: each row looks at angles of its own. */
  readonly firstRow: number;
  readonly charts: readonly CodeChart[];
  readonly angles: SeenAngles | null;
  readonly rules: ReadingRules;
  readonly leftOut: Uint8Array;
  readonly settled: SettledField;
  readonly reach: 1 | 2;
}

export interface BandJobs {
  readBand: { readonly in: BandTask; readonly out: MapRows };
}

export interface LeadJobs {
  openPhoto: {
    readonly in: { readonly file: unknown; readonly fileName: string };
    readonly out: OpenedPhoto;
  };
  /** Calibrates and settles orders; answers with the bands that other workers are to read. */
  prepare: { readonly in: { readonly setup: Setup; readonly bands: number }; readonly out: PreparedMap };
  /** The map at the places of the order step, with the fit of the last `prepare`; null where that fit does not serve. */
  preview: { readonly in: { readonly setup: Setup }; readonly out: ThicknessMap | null };
  /** Reads the band that the lead keeps for itself. */
  readOwn: { readonly in: null; readonly out: null };
  finish: { readonly in: { readonly bands: readonly MapRows[] }; readonly out: EstimateResult };
  /** How much there is on the last finished map; null before there is one. */
  tally: { readonly in: TallyRequest; readonly out: TallyReport | null };
  probe: { readonly in: { readonly x: number; readonly y: number }; readonly out: Probe | null };
  /** Fits the camera to the open photo of a colour target. */
  target: {
    readonly in: { readonly corners: FourCorners; readonly light: Light | undefined };
    readonly out: TargetReading;
  };
  chart: { readonly in: { readonly setup: Setup; readonly maxThicknessNm: number }; readonly out: ChartView };
}

export interface PreparedMap {
  /** Top to bottom, below the band that the lead keeps. */
  readonly others: readonly BandTask[];
}
