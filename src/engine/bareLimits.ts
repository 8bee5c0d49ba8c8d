import type { AngleCharts } from '../match/angleCharts.ts';
import type { CodeChart } from '../match/codeChart.ts';
import type { PhotoPixels } from '../photo/types.ts';
import { cosineReader } from '../view/waterFields.ts';
import type { SeenAngles } from './seenAngles.ts';

/** Side of the squares of pixels whose mean is looked at: about the reach of the smoothing, so that noise is as small. */
const SIDE = 4;
/** What such a mean is off by without waves, one standard deviation, codes of 255 (set on seeded scenes). */
const STILL_CODES = 0.6;
/** Tilt of the surface where the photo shows too little bare water to tell, radians: sheltered water (a judgement). */
const USUAL_TILT_RAD = 0.01;
const LEAST_SQUARES = 40;
/** Colours this close to bare water's, in codes of chroma, and not much darker, are bare water that waves have darkened. */
const NEAR_CHROMA = 5;
const NEAR_DARKER = 0.6;
/** Median of the size of a normal deviate. */
const MEDIAN_SIZE = 0.6744897501960817;
/**
 * Standard deviations that a brightness must stand out by to be film: a critical level as of Currie 1968 (Anal. Chem.
 * 40:586). One is few for a single decision, but here it is the one at which about as much thin film passes for water as
 * water for film, so that the oiled area comes out right (set on seeded scenes).
 */
const CRITICAL = 1;

/**
 * Thickness under which film cannot be told from bare water, for each angle of a slanted photo, nm. Seen flat, a wave's
 * slope changes how bright bare water is, and a few nanometres of film do the same. How much the surface tilts is read off
 * the photo: oil between air and water only brightens, so what is darker than bare water but of its colour is
 * bare water tilted, and its spread is half of the whole.
 * @param leastNm limit without waves
 */
export function bareLimits(
  pixels: PhotoPixels,
  leftOut: Uint8Array | null,
  { charts, view }: Pick<SeenAngles, 'charts' | 'view'>,
  leastNm: number,
): Float64Array {
  const { incidenceRad } = charts;
  const calm = charts.charts.map(([chart]) => chart!);
  const bare = calm.map(({ codes }) => lumaOf(codes[0]!, codes[1]!, codes[2]!));
  const perRad = bare.map((_, k) => {
    const [a, b] = [Math.max(0, k - 1), Math.min(bare.length - 1, k + 1)];
    return a === b ? 0 : Math.abs((bare[b]! - bare[a]!) / (incidenceRad[b]! - incidenceRad[a]!));
  });
  const tilt = tiltOf(pixels, leftOut, charts, calm, perRad, cosineReader(view));
  return Float64Array.from(calm, (chart, k) =>
    Math.max(leastNm, thicknessBrighterBy(chart, CRITICAL * Math.hypot(STILL_CODES, tilt * perRad[k]!))),
  );
}

/** Spread of the surface's tilt along the line of sight, radians, one standard deviation. */
function tiltOf(
  { width, height, channels, codes, maxCode }: PhotoPixels,
  leftOut: Uint8Array | null,
  { incidenceRad }: AngleCharts,
  calm: readonly CodeChart[],
  perRad: readonly number[],
  cosineAt: (x: number, y: number) => number,
): number {
  const scale = 255 / (maxCode * SIDE * SIDE);
  const tilts: number[] = [];
  for (let top = 0; top + SIDE <= height; top += SIDE) {
    for (let left = 0; left + SIDE <= width; left += SIDE) {
      let [red, green, blue] = [0, 0, 0];
      let whole = true;
      for (let k = 0; k < SIDE * SIDE && whole; k++) {
        const i = (top + (k >> 2)) * width + left + (k & 3);
        whole = !leftOut || leftOut[i] === 0;
        red += codes[i * channels]!;
        green += codes[i * channels + 1]!;
        blue += codes[i * channels + 2]!;
      }
      if (!whole) continue;
      const angle = Math.acos(Math.max(0, cosineAt(left + SIDE / 2 - 0.5, top + SIDE / 2 - 0.5)));
      const k = stretchOf(incidenceRad, angle);
      const slope = perRad[k]!;
      if (slope * USUAL_TILT_RAD < STILL_CODES) continue;
      const next = Math.min(k + 1, calm.length - 1);
      const share = next > k ? (angle - incidenceRad[k]!) / (incidenceRad[next]! - incidenceRad[k]!) : 0;
      const bareAt = (c: number) => (1 - share) * calm[k]!.codes[c]! + share * calm[next]!.codes[c]!;
      const seen = lumaOf(red * scale, green * scale, blue * scale);
      const still = lumaOf(bareAt(0), bareAt(1), bareAt(2));
      if (seen >= still || seen < NEAR_DARKER * still) continue;
      const offRed = red * scale - seen - (bareAt(0) - still);
      const offBlue = blue * scale - seen - (bareAt(2) - still);
      // Chroma as in ITU-T T.871.
      if (Math.hypot(0.713 * offRed, 0.564 * offBlue) < NEAR_CHROMA) tilts.push((still - seen) / slope);
    }
  }
  if (tilts.length < LEAST_SQUARES) return USUAL_TILT_RAD;
  tilts.sort((a, b) => a - b);
  return tilts[tilts.length >> 1]! / MEDIAN_SIZE;
}

/** Place of the last angle at or before this one. */
function stretchOf(incidenceRad: Float64Array, angle: number): number {
  let k = 0;
  while (k + 2 < incidenceRad.length && incidenceRad[k + 1]! <= angle) k++;
  return k;
}

/** Least thickness that is this much brighter than none, codes; that of the first bright band where none is. */
function thicknessBrighterBy({ codes, thicknessNm, count }: CodeChart, byCodes: number): number {
  const lumaAt = (j: number) => lumaOf(codes[3 * j]!, codes[3 * j + 1]!, codes[3 * j + 2]!);
  const bare = lumaAt(0);
  let best = 0;
  for (let j = 1; j < count && lumaAt(j) >= lumaAt(best); j++) {
    best = j;
    if (lumaAt(j) - bare > byCodes) break;
  }
  return thicknessNm[best]!;
}

/** ITU-R BT.601, as JPEG has it. */
function lumaOf(red: number, green: number, blue: number): number {
  return 0.299 * red + 0.587 * green + 0.114 * blue;
}
