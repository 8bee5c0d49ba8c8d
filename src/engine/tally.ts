import { type CommonError, commonSdOfMean } from '../match/commonError.ts';
import { PIXEL_STATUS, type ThicknessMap } from '../match/types.ts';
import { seededRandom } from '../scene/random.ts';
import { type AppearanceShares, volumeByCode } from '../tally/appearanceCode.ts';
import { type MappedShares, sharesFromMap } from '../tally/appearanceShares.ts';
import { type CommonDraw, commonDraw, type FilmIndex, scaleDraw } from '../tally/commonDraw.ts';
import { compareMethods } from '../tally/compareMethods.ts';
import type { FilmRegion } from '../tally/filmRegion.ts';
import { type OiledArea, oiledArea } from '../tally/oiledArea.ts';
import { type VolumeInputs, volumeByThickness } from '../tally/volumeByThickness.ts';
import { type AreaCells, areaCells } from '../view/areaCells.ts';
import type { SunPosition } from '../view/sun.ts';
import { dropExcluded, viewShares, viewStatus } from '../view/viewLimits.ts';
import { LEFT_OUT, paintedOutside } from './leftOut.ts';
import { groundAreaOf, incidenceOf, type PhotoView } from './photoView.ts';
import { prepareScene } from './prepareScene.ts';
import type { PositionSetup, Setup } from './setup.ts';
import type {
  TallyInMetres,
  TallyInPixels,
  TallyOptions,
  TallyReport,
  TallyShares,
} from './tallyContract.ts';
import type { TallyFacts } from './tallyFacts.ts';
import { headingOf, positionOf, sunOf, tallyNotices } from './tallyNotices.ts';

/**
 * How much there is on a measured photo: areas, coverage, thickness histogram, volumes by thickness and by appearance
 * code. Pixels that the map calls outside (region, strokes) do not count; those that the view leaves out are counted
 * as excluded. Without a view (`null`) there are shares by pixel count and no metres.
 * @throws RangeError, SetupError with a sentence that says what to do
 */
export function tallyPhoto(
  map: ThicknessMap,
  setup: Setup,
  view: PhotoView | null,
  options: TallyOptions = {},
  facts: TallyFacts = {},
): TallyReport {
  const place: Place = {
    sun: sunOf(setup, facts.metadata),
    position: positionOf(setup, facts.metadata),
    headingDeg: headingOf(setup, facts.metadata),
  };
  return view
    ? inMetres(map, setup, view, options, facts, place)
    : inPixels(map, setup, options, facts, place);
}

interface Place {
  readonly sun: SunPosition | null;
  readonly position: PositionSetup | null;
  readonly headingDeg: number | null;
}

function inMetres(
  map: ThicknessMap,
  setup: Setup,
  view: PhotoView,
  options: TallyOptions,
  facts: TallyFacts,
  place: Place,
): TallyInMetres {
  const { width, height, status } = map;
  const incidenceRad = incidenceOf(view);
  const areaM2 = groundAreaOf(view);
  const byView = viewStatus(incidenceRad);
  // The estimate calls pixels outside that look too flat: what was marked tells them from what was left out by hand.
  const region = paintedOutside(width, height, setup).map((mark) => (mark === LEFT_OUT.no ? 1 : 0));
  dropExcluded(areaM2, byView);
  for (let i = 0; i < status.length; i++) if (status[i] === PIXEL_STATUS.outside) areaM2[i] = Number.NaN;
  const film: FilmRegion = { map, areaM2 };
  const counted = countIn(region, areaM2);
  const regionPixels = region.reduce((sum, value) => sum + value, 0);
  const area: OiledArea = { ...oiledArea(film), excludedPixels: regionPixels - counted };
  const mapped = sharesFromMap(film, options.atLeastCode);
  const cells = areaCells(width, height);
  const byThickness = volumeByThickness(
    film,
    cells,
    drawOf(view, cells, filmIndexOf(setup, facts.common)),
    seededRandom(options.seed ?? 1),
    {
      ...(facts.common && commonInputs(film, facts.common)),
      ...(options.trials !== undefined && { trials: options.trials }),
    },
  );
  const shares = sharesOf(mapped, area, options.shares);
  const byCode =
    shares.used && volumeByCode(shares.from === 'map' ? mapped.codedM2 : area.oiledM2, shares.used);
  const seen = viewShares(byView, region);
  return {
    scale: 'metres',
    area,
    mapped,
    byThickness,
    byCode,
    comparison: byCode && compareMethods(byThickness, byCode, mapped),
    viewShares: seen,
    excludedShare: regionPixels > 0 ? area.excludedPixels / regionPixels : 0,
    incidenceDeg: incidenceRange(incidenceRad, region, areaM2),
    lengthCheck: view.lengthCheck,
    ...sharesByArea(area, counted),
    shares,
    ...place,
    notices: tallyNotices({
      setup,
      options,
      facts,
      ...place,
      shares,
      mapped,
      view,
      seen,
      byThickness,
    }),
  };
}

/** Every pixel counts the same: what comes out of the sums of "area" is a number of pixels. */
function inPixels(
  map: ThicknessMap,
  setup: Setup,
  options: TallyOptions,
  facts: TallyFacts,
  place: Place,
): TallyInPixels {
  const pixels = map.width * map.height;
  const film: FilmRegion = { map, areaM2: new Float32Array(pixels).fill(1) };
  const counts = oiledArea(film);
  const mapped = sharesFromMap(film, options.atLeastCode);
  const shares = sharesOf(mapped, counts, options.shares);
  return {
    scale: 'pixels',
    area: null,
    mapped: null,
    byThickness: null,
    byCode: null,
    comparison: null,
    viewShares: null,
    excludedShare: null,
    incidenceDeg: null,
    lengthCheck: null,
    ...sharesByArea(counts, counts.regionM2),
    shares,
    ...place,
    notices: tallyNotices({ setup, options, facts, ...place, shares, mapped }),
  };
}

function sharesByArea(area: OiledArea, countedPixels: number) {
  const { regionM2, oiledM2, histogram } = area;
  const shareOf = (part: number, whole: number) => (whole > 0 ? part / whole : 0);
  const withThickness = histogram.areaM2.reduce((sum, m2) => sum + m2, 0);
  return {
    coverage: {
      share: numberOrNull(area.coverage),
      least: numberOrNull(area.coverageLeast),
      most: numberOrNull(area.coverageMost),
    },
    regionShares: {
      oiled: shareOf(oiledM2, regionM2),
      bare: shareOf(area.bareM2, regionM2),
      unread: shareOf(area.unreadM2, regionM2),
    },
    histogram: {
      stepNm: histogram.stepNm,
      share: histogram.areaM2.map((m2) => shareOf(m2, withThickness)),
    },
    atLeastShare: shareOf(area.atLeastM2, oiledM2),
    ambiguousShare: shareOf(area.ambiguousM2, oiledM2),
    countedPixels,
  };
}

function sharesOf(mapped: MappedShares, area: OiledArea, observed?: AppearanceShares): TallyShares {
  const oiled = area.oiledM2;
  return {
    used: observed ?? mapped.shares,
    from: observed ? 'observer' : 'map',
    ofMap: mapped.shares,
    belowCode: oiled > 0 ? mapped.belowM2 / oiled : 0,
    atLeast: oiled > 0 ? mapped.atLeastM2 / oiled : 0,
  };
}

/**
 * By how much film seen at more than 60 degrees may be thicker than read: there it was 1.1 to 1.4 times as much on seeded
 * scenes of 480 x 640 pixels (seeds 1 to 4), because narrow bands lose their colour to compression and are read an order too
 * thin. Larger photos lose less; the interval is then too wide rather than too narrow.
 */
const LOST_ORDERS = 0.5;

/** Errors of view and index; only of scale and index where a pixel size is all that is known of the view. */
function drawOf(view: PhotoView, cells: AreaCells, index: FilmIndex): CommonDraw {
  return view.view && view.poses
    ? commonDraw(view.view, cells, view.poses, index, LOST_ORDERS)
    : scaleDraw(index, view.sd.heightShare);
}

/** The index that phase goes by; its doubt is in the common error where there is one. */
function filmIndexOf(setup: Setup, common: CommonError | undefined): FilmIndex {
  const { film } = prepareScene(setup).scene.stack;
  return { index: film.refractiveIndex(MIDDLE_NM), indexSd: common ? 0 : film.indexSpread };
}

/** Wavelength at which one index stands for all of them: the middle of what is seen. */
const MIDDLE_NM = 550;

/** The common error as it comes out in the sum over this film: what moves thin and thick film apart cancels in part. */
function commonInputs({ map, areaM2 }: FilmRegion, common: CommonError): Partial<VolumeInputs> {
  const areaAt = new Float64Array(common.parts.length / common.count);
  const last = areaAt.length - 1;
  for (let i = 0; i < areaM2.length; i++) {
    const status = map.status[i]!;
    if (status !== PIXEL_STATUS.measured && status !== PIXEL_STATUS.ambiguous) continue;
    const area = areaM2[i]!;
    if (area > 0) areaAt[Math.min(last, Math.round(map.thicknessNm[i]! / common.stepNm))]! += area;
  }
  return { thicknessShiftNm: commonSdOfMean(common, areaAt), thicknessShare: common.relativeSd };
}

function countIn(region: Uint8Array, areaM2: Float32Array): number {
  let count = 0;
  for (let i = 0; i < region.length; i++) if (region[i] === 1 && areaM2[i]! > 0) count++;
  return count;
}

function incidenceRange(
  incidenceRad: Float32Array,
  region: Uint8Array,
  areaM2: Float32Array,
): TallyInMetres['incidenceDeg'] {
  let least = Number.POSITIVE_INFINITY;
  let most = Number.NEGATIVE_INFINITY;
  for (let i = 0; i < region.length; i++) {
    if (region[i] === 0 || !(areaM2[i]! > 0)) continue;
    const angle = incidenceRad[i]!;
    if (angle < least) least = angle;
    if (angle > most) most = angle;
  }
  return least <= most ? { least: (least * 180) / Math.PI, most: (most * 180) / Math.PI } : null;
}

function numberOrNull(value: number): number | null {
  return Number.isFinite(value) ? value : null;
}
