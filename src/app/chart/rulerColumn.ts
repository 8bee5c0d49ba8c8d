import type { ChartView } from '../../engine/contract.ts';
import { html, type SafeHtml } from '../../record/html.ts';
import { markedPairs, rowAt } from './likeColours.ts';

/** Where a piece of the ruler stands; lengths in units of the drawing. */
export interface ColumnPlace {
  readonly fromNm: number;
  readonly toNm: number;
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly height: number;
  readonly fontSize: number;
}

/** Largest number of coloured strips: finer than any eye or printer tells on a ruler. */
const MOST_STRIPS = 1000;
/** Shares of the column's width: figures, colour, orders, sensitivity; look-alikes take the rest. `.chart-heads` has the same. */
const PARTS = { labels: 0.18, band: 0.37, orders: 0.1, sensitivity: 0.13 } as const;

/** "rgb(1,2,3)" of the chart at a thickness. */
export function colourAt(view: ChartView, nm: number): string {
  const i = 3 * rowAt(view, nm);
  return `rgb(${view.displayRgb[i]},${view.displayRgb[i + 1]},${view.displayRgb[i + 2]})`;
}

/** Colour strips of a stretch of thickness, equal neighbours merged; thin at the top. */
export function strips(
  view: ChartView,
  place: Omit<ColumnPlace, 'fontSize'>,
  mostStrips = MOST_STRIPS,
): SafeHtml[] {
  const { fromNm, toNm, x, y, width, height } = place;
  const count = Math.max(1, Math.min(mostStrips, Math.round((toNm - fromNm) / view.stepNm)));
  const edge = (k: number) => round(y + (height * k) / count);
  const colours = Array.from({ length: count }, (_, k) =>
    colourAt(view, fromNm + ((k + 0.5) * (toNm - fromNm)) / count),
  );
  const out: SafeHtml[] = [];
  for (let k = 0; k < count; ) {
    let end = k + 1;
    while (end < count && colours[end] === colours[k]) end++;
    // A strip reaches under the next one, or hairlines of the paper show between them.
    const bottom = end < count ? edge(end + 1) : edge(end);
    out.push(
      html`<rect x="${x}" y="${edge(k)}" width="${width}" height="${round(bottom - edge(k))}" fill="${colours[k] ?? ''}"/>`,
    );
    k = end;
  }
  return out;
}

/** The step of labelled ticks: the finest round one that leaves a label room to breathe. */
export function labelStepNm(toNm: number, height: number, fontSize: number): number {
  const least = (2.2 * fontSize * toNm) / height;
  return [50, 100, 200, 250, 500].find((step) => step >= least) ?? 1000;
}

/**
 * A stretch of the colour ruler as SVG elements: nanometres, colour with the resolvable range as a bracket, orders,
 * sensitivity (colour change a nanometre) as a curve, and look-alikes of other orders. Lines and text take
 * `currentColor`, so that it stands on paper, in the dark and in the sun.
 */
export function rulerColumn(view: ChartView, place: ColumnPlace): SafeHtml {
  const { x, width } = place;
  const bandX = x + PARTS.labels * width;
  const bandWidth = PARTS.band * width;
  const ordersX = bandX + bandWidth;
  const sensitivityX = ordersX + PARTS.orders * width;
  const likeX = sensitivityX + PARTS.sensitivity * width;
  return html`<g fill="currentColor" font-size="${place.fontSize}" font-family="system-ui, sans-serif">
${strips(view, { ...place, x: bandX, width: bandWidth })}
${ticks(place, bandX)}
${bracket(view, place, bandX)}
${orders(view, place, bandX, ordersX, PARTS.orders * width)}
${sensitivityCurve(view, place, sensitivityX, 0.9 * PARTS.sensitivity * width)}
${lookAlikeMarks(view, place, likeX)}
</g>`;
}

const round = (value: number) => Math.round(100 * value) / 100;

const toY =
  ({ fromNm, toNm, y, height }: ColumnPlace) =>
  (nm: number) =>
    round(y + ((nm - fromNm) / (toNm - fromNm)) * height);

function ticks(place: ColumnPlace, bandX: number): SafeHtml[] {
  const { fromNm, toNm, height, fontSize } = place;
  const yOf = toY(place);
  const labelNm = labelStepNm(toNm - fromNm, height, fontSize);
  const stepNm = labelNm / 5;
  const out: SafeHtml[] = [];
  for (let k = Math.ceil(fromNm / stepNm); k * stepNm <= toNm + 1e-9; k++) {
    const nm = Math.round(k * stepNm * 1e6) / 1e6;
    const isLabelled = k % 5 === 0;
    const length = isLabelled ? 0.8 * fontSize : 0.4 * fontSize;
    const left = bandX - 0.5 * fontSize;
    out.push(
      html`<path d="M${round(left)} ${yOf(nm)}h${-round(length)}" stroke="currentColor" stroke-width="${round(0.07 * fontSize)}"/>`,
    );
    if (isLabelled) {
      out.push(
        html`<text x="${round(left - length - 0.25 * fontSize)}" y="${round(yOf(nm) + 0.35 * fontSize)}" text-anchor="end">${nm}</text>`,
      );
    }
  }
  return out;
}

/** A line beside the colours with an end where colour stops telling; dashed beyond. */
function bracket(view: ChartView, place: ColumnPlace, bandX: number): SafeHtml {
  const yOf = toY(place);
  const clamp = (nm: number) => Math.min(place.toNm, Math.max(place.fromNm, nm));
  const from = clamp(view.resolvableNm.fromNm);
  const to = clamp(view.resolvableNm.toNm);
  const x = round(bandX - 0.25 * place.fontSize);
  const width = 0.16 * place.fontSize;
  const cap = 0.25 * place.fontSize;
  const endsHere = view.resolvableNm.toNm >= place.fromNm && view.resolvableNm.toNm < place.toNm;
  return html`<g stroke="currentColor" fill="none" stroke-width="${round(width)}">${to > from && html`<path d="M${x} ${yOf(from)}V${yOf(to)}"/>`}${
    endsHere && html`<path d="M${round(x - cap)} ${yOf(to)}H${round(bandX + 2 * cap)}"/>`
  }${to < place.toNm && html`<path d="M${x} ${yOf(to)}V${yOf(place.toNm)}" stroke-dasharray="${round(width)} ${round(3 * width)}"/>`}</g>`;
}

function orders(view: ChartView, place: ColumnPlace, bandX: number, x: number, width: number): SafeHtml[] {
  const { fromNm, toNm, fontSize } = place;
  const yOf = toY(place);
  const edges = [0, ...view.orderBoundariesNm, Number.POSITIVE_INFINITY];
  const out: SafeHtml[] = [];
  for (let k = 0; k + 1 < edges.length; k++) {
    const start = Math.max(fromNm, edges[k] ?? 0);
    const end = Math.min(toNm, edges[k + 1] ?? toNm);
    if (end <= start) continue;
    if (start > fromNm) {
      out.push(
        html`<path d="M${round(bandX)} ${yOf(start)}H${round(x + width)}" stroke="currentColor" stroke-width="${round(0.1 * fontSize)}"/>`,
      );
    }
    if (yOf(end) - yOf(start) < 1.4 * fontSize) continue;
    out.push(
      html`<text x="${round(x + width / 2)}" y="${round((yOf(start) + yOf(end)) / 2 + 0.35 * fontSize)}" text-anchor="middle" font-weight="600">${k + 1}</text>`,
    );
  }
  return out;
}

/** Widest at the largest sensitivity of the whole chart, so that columns of one card compare. */
function sensitivityCurve(view: ChartView, place: ColumnPlace, x: number, width: number): SafeHtml {
  const yOf = toY(place);
  let largest = 1e-9;
  for (const value of view.sensitivityPerNm) largest = Math.max(largest, value);
  const stepNm = Math.max(view.stepNm, (place.toNm - place.fromNm) / 400);
  let path = `M${round(x)} ${yOf(place.fromNm)}`;
  for (let nm = place.fromNm; nm <= place.toNm + 1e-9; nm += stepNm) {
    const share = (view.sensitivityPerNm[rowAt(view, nm)] ?? 0) / largest;
    path += `L${round(x + share * width)} ${yOf(nm)}`;
  }
  return html`<path d="${path}L${round(x)} ${yOf(place.toNm)}Z" fill-opacity="0.35"/>`;
}

/** "≈ 505" at either end of a pair; where labels would touch, the likest pair keeps its own. */
function lookAlikeMarks(view: ChartView, place: ColumnPlace, x: number): SafeHtml[] {
  const yOf = toY(place);
  const taken: number[] = [];
  const out: SafeHtml[] = [];
  for (const { aNm, bNm } of markedPairs(view)) {
    for (const [at, other] of [
      [aNm, bNm],
      [bNm, aNm],
    ] as const) {
      if (at < place.fromNm || at > place.toNm) continue;
      const y = yOf(at);
      if (taken.some((other) => Math.abs(other - y) < 1.15 * place.fontSize)) continue;
      taken.push(y);
      out.push(
        html`<text x="${round(x)}" y="${round(y + 0.35 * place.fontSize)}">≈ ${Math.round(other)}</text>`,
      );
    }
  }
  return out;
}
