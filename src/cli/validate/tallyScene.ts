import type { EstimateResult } from '../../engine/contract.ts';
import { photoViewOf } from '../../engine/photoView.ts';
import { tallyPhoto } from '../../engine/tally.ts';
import type { TallyFacts } from '../../engine/tallyFacts.ts';
import type { Scene } from '../../scene/types.ts';

/** An estimate with what it leaves for the tally. */
export interface TalliedEstimate extends EstimateResult {
  readonly tallyFacts?: TallyFacts;
}

/** A tally beside the truth of its scene. Sent between processes: data only. */
export interface TallyReading {
  /** Measured / true - 1. */
  readonly oiledError: number;
  readonly volumeError: number;
  /** The same with what the told height's own error does to areas divided out. */
  readonly oiledErrorTrueHeight: number;
  readonly volumeErrorTrueHeight: number;
  /** Measured - true, 0 to 1. */
  readonly coverageError: number;
  /** Whether the 90 % intervals of volume and oiled area hold the truth. */
  readonly volumeHeld: boolean;
  readonly oiledHeld: boolean;
  /** Whether the truth lies between least and most of the appearance code. */
  readonly codeHeld: boolean;
  /** Most / least. */
  readonly thicknessFactor: number;
  readonly codeFactor: number;
  /** Of the region's area. */
  readonly unreadShare: number;
  readonly excludedShare: number;
}

/** Tallies a map of a scene over level water; null for other scenes. */
export function tallyScene(scene: Scene, { map, tallyFacts }: TalliedEstimate): TallyReading | null {
  const { water, setup, width, height, view: trueView } = scene;
  if (!water || !setup.view) return null;
  const report = tallyPhoto(map, setup, photoViewOf(setup, width, height), {}, tallyFacts);
  if (report.scale !== 'metres') return null;
  const { byThickness, byCode, coverage } = report;
  const trueM3 = water.volumeMl * 1e-6;
  const isIn = (value: number, least: number, most: number) => value >= least && value <= most;
  const { least, best, most } = byThickness.volumeM3;
  const { oiledM2 } = byThickness;
  const toldM = setup.view.heightM;
  // All areas go with the square of the height.
  const scale = toldM && trueView ? (toldM / trueView.heightM) ** 2 : 1;
  return {
    oiledError: oiledM2.best / water.oiledM2 - 1,
    volumeError: best / trueM3 - 1,
    oiledErrorTrueHeight: oiledM2.best / scale / water.oiledM2 - 1,
    volumeErrorTrueHeight: best / scale / trueM3 - 1,
    coverageError: (coverage.share ?? Number.NaN) - water.oiledM2 / water.regionM2,
    volumeHeld: isIn(trueM3, least, most),
    oiledHeld: isIn(water.oiledM2, oiledM2.least, oiledM2.most),
    codeHeld: byCode !== null && isIn(trueM3, byCode.minM3, byCode.maxM3),
    thicknessFactor: most / least,
    codeFactor: byCode ? byCode.maxM3 / byCode.minM3 : Number.NaN,
    unreadShare: report.regionShares.unread,
    excludedShare: report.excludedShare,
  };
}
