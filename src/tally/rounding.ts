/**
 * Rounds a value so that it carries no more digits than its interval allows: to the second significant digit of half the
 * interval's width where its three leading digits are 100 to 354, to the first where they are 355 to 999 (Particle Data
 * Group, Review of Particle Physics, rule for rounding). An interval of no width, or no number, leaves 3 digits.
 */
export function roundToInterval(value: number, low: number, high: number): number {
  if (value === 0 || !Number.isFinite(value)) {
    return value;
  }
  return roundTo(value, placeOf(value, (high - low) / 2));
}

/**
 * Least, best and most of one interval, all to the same decimal place, as strings in plain decimal notation. The ends
 * are rounded outwards, so the printed interval never claims more than was found.
 */
export function formatInterval(
  low: number,
  value: number,
  high: number,
): { readonly low: string; readonly value: string; readonly high: string } {
  const place = placeOf(value === 0 ? high : value, (high - low) / 2);
  const step = 10 ** place;
  const print = (x: number) => (Number.isFinite(x) ? x.toFixed(Math.max(0, -place)) : '–');
  return {
    low: print(step * Math.floor(low / step + 1e-9)),
    value: print(roundTo(value, place)),
    high: print(step * Math.ceil(high / step - 1e-9)),
  };
}

/** Step to which a thickness is rounded, from the width of its interval; both in nanometres. */
export function thicknessStepNm(widthNm: number): number {
  if (!(widthNm >= 12)) return 1;
  return widthNm < 60 ? 5 : 10;
}

/** Coarsest interval whose rounding a median is given: medians of many pixels are sharper than one pixel. */
const MEDIAN_WIDTH_NM = 20;

/** 5th, 50th and 95th percentile of a map's thickness as a person says them, "1,010": for nanometres. */
export function thicknessQuantiles({
  p05,
  p50,
  p95,
}: {
  readonly p05: number;
  readonly p50: number;
  readonly p95: number;
}) {
  const text = (nm: number, widthNm: number) => {
    const step = thicknessStepNm(widthNm);
    return (Math.round(nm / step) * step).toLocaleString('en-GB');
  };
  const spread = p95 - p05;
  return {
    p05: text(p05, spread),
    p50: text(p50, Math.min(spread, MEDIAN_WIDTH_NM)),
    p95: text(p95, spread),
  };
}

/** The power of ten to round to. */
function placeOf(value: number, halfWidth: number): number {
  if (!(halfWidth > 0 && Number.isFinite(halfWidth))) {
    return value === 0 || !Number.isFinite(value) ? 0 : Math.floor(Math.log10(Math.abs(value))) - 2;
  }
  const place = Math.floor(Math.log10(halfWidth));
  return halfWidth / 10 ** place < 3.55 ? place - 1 : place;
}

function roundTo(value: number, place: number): number {
  // Through the decimal string: 10 ** -2 and its multiples are not exact in binary.
  return Number(`${Math.round(Number(`${value}e${-place}`))}e${place}`);
}
