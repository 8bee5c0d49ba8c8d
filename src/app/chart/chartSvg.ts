import type { ChartView } from '../../engine/contract.ts';
import { html, type SafeHtml } from '../../record/html.ts';
import { rulerColumn } from './rulerColumn.ts';
import { type ChartSetup, setupLines } from './setupWords.ts';

const WIDTH = 480;
const HEIGHT = 1480;
const MARGIN = 24;
const RULER_TOP = 148;
const RULER_BOTTOM = 84;

/** What the columns of a ruler mean, and how far to trust it: stands on the sheet and on the card. */
export function readingNotes({ resolvableNm }: ChartView, toNm: number): string[] {
  const known = 'once the order is known';
  const reach =
    resolvableNm.toNm >= toNm
      ? [`Solid line: colour tells thickness over all of it, ${known}.`]
      : [
          `Solid line: colour tells thickness, ${known}. Dotted: too pale;`,
          `say "at least ${Math.floor(resolvableNm.toNm / 50) * 50} nm".`,
        ];
  return [...reach, 'Grey curve: colour change a nanometre. ≈ a like colour of another order, at that nm.'];
}

/** Last thickness of a chart, nm. */
export function chartEndNm(view: ChartView): number {
  return (view.count - 1) * view.stepNm;
}

const page = (width: number, height: number, title: string, unit: string, content: SafeHtml) =>
  `${
    html`<svg xmlns="http://www.w3.org/2000/svg" width="${width}${unit}" height="${height}${unit}" viewBox="0 0 ${width} ${height}" role="img" color="#000"><title>${title}</title><rect width="${width}" height="${height}" fill="#fff"/>${content}</svg>`
      .text
  }\n`;

/** The whole ruler as a sheet of its own: black on white, the set-up on it. */
export function chartSvg(view: ChartView, setup: ChartSetup, appVersion: string): string {
  const [film = '', ...conditions] = setupLines(setup);
  const toNm = chartEndNm(view);
  const line = (text: string, y: number) => html`<text x="${MARGIN}" y="${y}">${text}</text>`;
  const notes = [...readingNotes(view, toNm), `Tintfathom ${appVersion}. Indicative only.`];
  return page(
    WIDTH,
    HEIGHT,
    `Colours of a thin film: ${film}, 0 to ${toNm} nm`,
    '',
    html`<g font-family="system-ui, sans-serif" font-size="13" fill="#000"><text x="${MARGIN}" y="46" font-size="26" font-weight="650">${film}</text>${conditions.map((text, i) => line(text, 72 + 18 * i))}<text x="${MARGIN}" y="${RULER_TOP - 20}" font-weight="600">thickness, nm</text><text x="${WIDTH - MARGIN}" y="${RULER_TOP - 20}" text-anchor="end" font-weight="600">order, sensitivity, ≈</text>${notes.map((text, i) => html`<text x="${MARGIN}" y="${HEIGHT - RULER_BOTTOM + 26 + 15 * i}" font-size="11">${text}</text>`)}</g>${rulerColumn(
      view,
      {
        fromNm: 0,
        toNm,
        x: MARGIN,
        y: RULER_TOP,
        width: WIDTH - 2 * MARGIN,
        height: HEIGHT - RULER_TOP - RULER_BOTTOM,
        fontSize: 12,
      },
    )}`,
  );
}

/** A6, millimetres. */
export const CARD_WIDTH_MM = 105;
export const CARD_HEIGHT_MM = 148;

/**
 * The pocket card: A6, the ruler in two columns, the set-up and how far to trust it printed on it. The frame is where to
 * cut.
 */
export function pocketCardSvg(view: ChartView, setup: ChartSetup, appVersion: string): string {
  const [film = '', ...conditions] = setupLines(setup);
  const toNm = chartEndNm(view);
  const middle = toNm / 2;
  const column = (fromNm: number, endNm: number, x: number) =>
    rulerColumn(view, { fromNm, toNm: endNm, x, y: 26, width: 47, height: 106, fontSize: 2.7 });
  const notes = [
    ...readingNotes(view, toNm),
    `Ink shifts colours: go by their sequence. Indicative only. Tintfathom ${appVersion}`,
  ];
  return page(
    CARD_WIDTH_MM,
    CARD_HEIGHT_MM,
    `Pocket card: ${film}`,
    'mm',
    html`<rect x="0.1" y="0.1" width="${CARD_WIDTH_MM - 0.2}" height="${CARD_HEIGHT_MM - 0.2}" fill="none" stroke="#888" stroke-width="0.2"/><g font-family="system-ui, sans-serif" font-size="2.7" fill="#000"><text x="5" y="9.5" font-size="5" font-weight="650">${film}</text>${conditions.map((text, i) => html`<text x="5" y="${14 + 3.6 * i}">${text}</text>`)}<text x="5" y="23" font-weight="600">nm</text>${notes.map((text, i) => html`<text x="5" y="${136.4 + 3.1 * i}" font-size="2.3">${text}</text>`)}</g>${column(0, middle, 4)}${column(middle, toNm, 54)}`,
  );
}
