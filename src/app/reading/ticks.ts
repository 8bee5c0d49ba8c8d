/** A place on a thickness axis and what stands there. */
export interface Tick {
  readonly nm: number;
  readonly text: string;
}

/** Range from which an axis is written in micrometres. */
const MICROMETRES_FROM_NM = 2000;

/** Round steps on an axis from 0 to `topNm`: 1, 2 or 5 times a power of ten (or 250), at most `most` of them; the last one names the unit. */
export function ticksTo(topNm: number, most: number): readonly Tick[] {
  const steps = [1, 2, 2.5, 5].flatMap((m) => [1, 10, 100, 1000].map((p) => m * p)).sort((a, b) => a - b);
  const step = steps.find((s) => topNm / s <= most) ?? topNm;
  const inMicrometres = topNm >= MICROMETRES_FROM_NM;
  const count = Math.floor(topNm / step + 1e-6);
  return Array.from({ length: count + 1 }, (_, k) => {
    const nm = k * step;
    const number = inMicrometres ? (nm / 1000).toString() : nm.toLocaleString('en-GB');
    return { nm, text: k === count ? `${number} ${inMicrometres ? 'µm' : 'nm'}` : number };
  });
}
