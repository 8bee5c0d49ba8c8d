/** Numbers as a person says them: no more digits than the interval allows. */
import { thicknessStepNm } from '../../tally/rounding.ts';

/** "310", or "1,240": thickness in nanometres rounded to what its interval supports. */
export function thicknessText(nm: number, widthNm: number): string {
  const step = thicknessStepNm(widthNm);
  return (Math.round(nm / step) * step).toLocaleString('en-GB');
}

/** "295 to 330": the interval, rounded outwards. */
export function intervalText(lowNm: number, highNm: number): string {
  const step = thicknessStepNm(highNm - lowNm);
  const low = Math.max(0, Math.floor(lowNm / step + 1e-6) * step);
  const high = Math.ceil(highNm / step - 1e-6) * step;
  return `${low.toLocaleString('en-GB')} to ${high.toLocaleString('en-GB')}`;
}

const ORDINALS = ['', 'first', 'second', 'third', 'fourth', 'fifth', 'sixth', 'seventh', 'eighth', 'ninth'];

/** "second order". */
export function orderText(order: number): string {
  return `${ORDINALS[order] ?? `${order}th`} order`;
}

/** "42 %", never "0 %" for something that is there; number and sign are not parted at a line's end. */
export function shareText(part: number, whole: number): string {
  if (whole <= 0) return '0\u00a0%';
  const percent = (100 * part) / whole;
  if (percent > 0 && percent < 1) return 'under 1\u00a0%';
  return `${Math.round(percent)}\u00a0%`;
}

/** "12,345.6": thousands parted in a figure printed in plain decimal notation. */
export function grouped(figure: string): string {
  const [whole = '', part] = figure.split('.');
  const parted = whole.replace(/\B(?=(\d{3})+$)/g, ',');
  return part === undefined ? parted : `${parted}.${part}`;
}

/** Shares as whole percentages that still add to 100 (largest remainders). */
export function wholePercents(shares: readonly number[]): number[] {
  const parts = shares.map((share, index) => {
    const whole = Math.floor(100 * share + 1e-9);
    return { index, whole, rest: 100 * share - whole };
  });
  let left = 100 - parts.reduce((sum, { whole }) => sum + whole, 0);
  const byRest = [...parts].sort((a, b) => b.rest - a.rest);
  const raised = new Set(byRest.filter(() => left-- > 0).map(({ index }) => index));
  return parts.map(({ index, whole }) => whole + (raised.has(index) ? 1 : 0));
}
