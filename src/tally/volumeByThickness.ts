import type { AreaCells } from '../view/areaCells.ts';
import { type Alternatives, type CellSums, cellSums } from './cellSums.ts';
import type { CommonDraw } from './commonDraw.ts';
import type { FilmRegion } from './filmRegion.ts';
import { type RandomNumbers, summarise } from './monteCarlo.ts';

/** What was put into an interval; kept with the result. */
export interface VolumeInputs {
  readonly trials: number;
  readonly coverage: number;
  /** One standard deviation of a factor common to all thicknesses, besides index and angle: chart and fit. */
  readonly thicknessShare: number;
  /** One standard deviation of a shift common to all thicknesses, nm. */
  readonly thicknessShiftNm: number;
  /** Pixels that share one error of colour: JPEG works in blocks of 8 x 8, so 64 where nothing better is known. */
  readonly correlatedPixels: number;
  /**
   * What gave no answer (glint, mirrored walls, posts) may be water as oily as the read water around it, or none: each
   * trial takes a share of it drawn evenly from 0 to this, 0 to 1. The best value takes the middle of that.
   */
  readonly unreadMost: number;
}

export const DEFAULT_VOLUME_INPUTS: VolumeInputs = {
  trials: 2000,
  coverage: 0.9,
  thicknessShare: 0.02,
  thicknessShiftNm: 2,
  correlatedPixels: 64,
  unreadMost: 1,
};

/** Never one bare number: ends of the coverage interval about the nominal value. */
export interface Spread {
  readonly least: number;
  readonly best: number;
  readonly most: number;
}

export interface VolumeByThickness {
  readonly volumeM3: Spread;
  readonly oiledM2: Spread;
  /** True where some film is past the resolvable range: all three volumes are then "at least". */
  readonly atLeast: boolean;
  /** Part of the best volume that is only a lower bound, and the share of the oiled area that it comes from. */
  readonly atLeastM3: number;
  readonly atLeastShare: number;
  /** Share of the oiled area whose order is not settled. */
  readonly ambiguousShare: number;
  /** Best volume over best area; NaN without oil. */
  readonly meanThicknessNm: number;
  readonly inputs: VolumeInputs;
}

/**
 * Oil volume as the sum of thickness times area over pixels with an answer, with a Monte Carlo interval (JCGM 101:2008).
 * What all pixels share (view, index, chart, shift) is drawn once a trial; what each pixel has to itself shrinks with
 * their number. Pixels past the resolvable range enter with their lower bound; water without an answer counts half in the
 * best value, and from nothing to all in the interval.
 * @param draw errors of view and index (`commonDraw`, `indexDraw`)
 * @param alternatives second readings of ambiguous pixels; without them their likeliest reading is taken as right
 * @throws RangeError where arrays or cells do not fit the map
 */
export function volumeByThickness(
  film: FilmRegion,
  cells: AreaCells,
  draw: CommonDraw,
  random: RandomNumbers,
  inputs: Partial<VolumeInputs> = {},
  alternatives?: Alternatives,
): VolumeByThickness {
  return volumeFromSums(cellSums(film, cells, alternatives), draw, random, inputs);
}

/** The same from sums at hand, for a change of the uncertainties without another pass over the pixels. */
export function volumeFromSums(
  sums: CellSums,
  draw: CommonDraw,
  random: RandomNumbers,
  some: Partial<VolumeInputs> = {},
): VolumeByThickness {
  const inputs = { ...DEFAULT_VOLUME_INPUTS, ...some };
  const { count } = sums.cells;
  const volumes = new Float64Array(inputs.trials);
  const areas = new Float64Array(inputs.trials);
  const areaFactor = new Float64Array(count);
  const thicknessFactor = new Float64Array(count);
  const { perM2, nmPerM2 } = unreadAsAround(sums);
  for (let trial = 0; trial < inputs.trials; trial++) {
    draw(random, areaFactor, thicknessFactor);
    const unread = inputs.unreadMost > 0 ? inputs.unreadMost * random.next() : 0;
    const factor = 1 + inputs.thicknessShare * random.normal();
    const shift = inputs.thicknessShiftNm * random.normal();
    let nmM2 = 0;
    let m2 = 0;
    let variance = 0;
    for (let cell = 0; cell < count; cell++) {
      const film = sums.filmM2[cell]!;
      const open = sums.atLeastM2[cell]!;
      const filled = unread * sums.unreadM2[cell]!;
      if (film + open + filled === 0) {
        continue;
      }
      const area = areaFactor[cell]!;
      const thickness = thicknessFactor[cell]! * factor;
      let sum = sums.filmNmM2[cell]!;
      if (sums.switchShare[cell]! > 0 && random.next() < sums.switchShare[cell]!) {
        sum += sums.switchNmM2[cell]!;
      }
      sum += sums.atLeastNmM2[cell]! + filled * nmPerM2[cell]!;
      const oiled = film + open + filled * perM2[cell]!;
      nmM2 += area * (thickness * sum + shift * oiled);
      m2 += area * oiled;
      variance += area * area * thickness * thickness * sums.varianceNm2M4[cell]!;
    }
    const noise = Math.sqrt(variance * inputs.correlatedPixels) * random.normal();
    volumes[trial] = 1e-9 * Math.max(0, nmM2 + noise);
    areas[trial] = m2;
  }
  const filmM2 = total(sums.filmM2);
  const atLeastM2 = total(sums.atLeastM2);
  const readM2 = filmM2 + atLeastM2;
  const half = inputs.unreadMost / 2;
  const oiledM2 = readM2 + half * product(sums.unreadM2, perM2);
  const atLeastM3 = 1e-9 * total(sums.atLeastNmM2);
  const bestM3 = 1e-9 * (total(sums.filmNmM2) + half * product(sums.unreadM2, nmPerM2)) + atLeastM3;
  return {
    volumeM3: spread(volumes, bestM3, inputs.coverage),
    oiledM2: spread(areas, oiledM2, inputs.coverage),
    atLeast: atLeastM2 > 0,
    atLeastM3,
    atLeastShare: readM2 > 0 ? atLeastM2 / readM2 : 0,
    ambiguousShare: readM2 > 0 ? total(sums.ambiguousM2) / readM2 : 0,
    meanThicknessNm: (1e9 * bestM3) / oiledM2,
    inputs,
  };
}

/** Oiled share and nm of oil over a square metre of read water in each cell; those of all cells where one has none. */
function unreadAsAround(sums: CellSums): { readonly perM2: Float64Array; readonly nmPerM2: Float64Array } {
  const { count } = sums.cells;
  const perM2 = new Float64Array(count);
  const nmPerM2 = new Float64Array(count);
  const oiled = total(sums.filmM2) + total(sums.atLeastM2);
  const read = oiled + total(sums.bareM2);
  const nmM2 = total(sums.filmNmM2) + total(sums.atLeastNmM2);
  for (let cell = 0; cell < count; cell++) {
    const here = sums.filmM2[cell]! + sums.atLeastM2[cell]!;
    const readHere = here + sums.bareM2[cell]!;
    const nmM2Here = sums.filmNmM2[cell]! + sums.atLeastNmM2[cell]!;
    perM2[cell] = readHere > 0 ? here / readHere : read > 0 ? oiled / read : 0;
    nmPerM2[cell] = readHere > 0 ? nmM2Here / readHere : read > 0 ? nmM2 / read : 0;
  }
  return { perM2, nmPerM2 };
}

function spread(values: Float64Array, best: number, coverage: number): Spread {
  const { low, high } = summarise(values, coverage).symmetric;
  return { least: low, best, most: high };
}

function product(a: Float64Array, b: Float64Array): number {
  return a.reduce((sum, value, i) => sum + value * b[i]!, 0);
}

function total(values: Float64Array): number {
  return values.reduce((sum, value) => sum + value, 0);
}
