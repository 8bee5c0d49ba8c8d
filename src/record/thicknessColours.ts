import { converter } from 'culori';
import { PIXEL_STATUS, type ThicknessMap } from '../match/types.ts';

const STEPS = 256;
const toRgb = converter('rgb');

/**
 * The ramp of thickness maps: lightness rises evenly in OKLab from a deep blue-violet to a pale sand, hue turning
 * slowly from blue to yellow-orange. Lightness alone orders it, so colour-blind eyes and grey prints read it; it does
 * not run through the film's own sequence of colours.
 * @returns 256 RGB bytes triples
 */
export function thicknessRamp(): Uint8Array {
  madeRamp ??= makeRamp();
  return madeRamp.slice();
}

/** Worked out once: legends, keys and bands of maps all ask for it. */
let madeRamp: Uint8Array | null = null;

function makeRamp(): Uint8Array {
  const ramp = new Uint8Array(3 * STEPS);
  for (let i = 0; i < STEPS; i++) {
    const t = i / (STEPS - 1);
    const colour = toRgb({
      mode: 'oklch',
      l: 0.2 + 0.72 * t,
      c: 0.04 + 0.1 * Math.sin(Math.PI * Math.min(1, 0.15 + 0.85 * t)),
      h: 290 - (t < 0.5 ? 90 * t * 2 : 90 + 110 * (t - 0.5) * 2),
    });
    const bytes = [colour?.r ?? 0, colour?.g ?? 0, colour?.b ?? 0];
    for (let c = 0; c < 3; c++) ramp[3 * i + c] = Math.round(255 * Math.min(1, Math.max(0, bytes[c]!)));
  }
  return ramp;
}

/** Greys of what has no thickness: outside, no film colour, and the two tones of the stripes of "at least". */
const OUTSIDE = 236;
const NO_FILM = 96;
const AT_LEAST = [200, 150] as const;
const BARE = [10, 14, 20] as const;
const STRIPE = 4;
/** Share of brightness that the dark squares of an ambiguous pixel's checker keep. */
const DIM = 0.7;

/** What a map shows besides the ramp, for its legend: CSS colours, two where the pattern has two. */
export function mapKeyColours(): readonly { readonly name: string; readonly colours: readonly string[] }[] {
  const grey = (level: number) => `rgb(${level},${level},${level})`;
  const ramp = thicknessRamp();
  const middle = [0, 1, 2].map((c) => ramp[3 * 128 + c]!);
  return [
    { name: 'bare surface', colours: [`rgb(${BARE.join(',')})`] },
    { name: 'too thick for colour', colours: AT_LEAST.map(grey) },
    { name: 'no film colour', colours: [grey(NO_FILM)] },
    {
      name: 'order not sure',
      colours: [`rgb(${middle.join(',')})`, `rgb(${middle.map((v) => Math.floor(v * DIM)).join(',')})`],
    },
    { name: 'not looked at', colours: [grey(OUTSIDE)] },
  ];
}

export interface PaintedMap {
  readonly rgb: Uint8Array;
  /** Thickness at the light end of the ramp, nm; 0 is at the dark end. */
  readonly topNm: number;
}

/**
 * Paints a map: the ramp from 0 to `topNm` (the largest thickness read, rounded up, unless given), greys and stripes
 * for the rest. Ambiguous pixels carry a fine checker so that colour is not the only sign.
 */
export function paintMap(map: ThicknessMap, topNm = niceTop(map)): PaintedMap {
  const ramp = thicknessRamp();
  const rgb = new Uint8Array(3 * map.status.length);
  for (let y = 0; y < map.height; y++) {
    for (let x = 0; x < map.width; x++) {
      const i = y * map.width + x;
      const status = map.status[i]!;
      const out = 3 * i;
      if (status === PIXEL_STATUS.measured || status === PIXEL_STATUS.ambiguous) {
        const step = Math.min(
          STEPS - 1,
          Math.max(0, Math.round((map.thicknessNm[i]! / topNm) * (STEPS - 1))),
        );
        const dim = status === PIXEL_STATUS.ambiguous && (x + y) % 4 < 2 ? DIM : 1;
        for (let c = 0; c < 3; c++) rgb[out + c] = ramp[3 * step + c]! * dim;
      } else if (status === PIXEL_STATUS.bare) {
        rgb.set(BARE, out);
      } else {
        const grey =
          status === PIXEL_STATUS.atLeast
            ? AT_LEAST[Math.floor((x + y) / STRIPE) % 2]!
            : status === PIXEL_STATUS.noFilmColour
              ? NO_FILM
              : OUTSIDE;
        rgb.fill(grey, out, out + 3);
      }
    }
  }
  return { rgb, topNm };
}

/** The largest thickness of a map, rounded up to a step a legend can show. */
export function niceTop(map: ThicknessMap): number {
  const { thicknessNm } = map;
  let largest = 0;
  // By index: an iterator takes several times as long over millions of pixels.
  for (let i = 0; i < thicknessNm.length; i++) if (thicknessNm[i]! > largest) largest = thicknessNm[i]!;
  const step = largest > 1000 ? 250 : largest > 200 ? 100 : 25;
  return Math.max(step, Math.ceil(largest / step) * step);
}
