import { html, type SafeHtml } from './html.ts';
import { mapKeyColours, thicknessRamp } from './thicknessColours.ts';

const WIDTH = 320;
const BAR = 12;
const STEPS = 64;

/** "nm" up to 2 µm at the light end, then micrometres. */
function tickText(nm: number, topNm: number): string {
  return topNm <= 2000 ? String(nm) : String(nm / 1000);
}

/** The step of 1, 2 or 5 times a power of ten that gives 4 to 10 ticks. */
function tickStep(topNm: number): number {
  const power = 10 ** Math.floor(Math.log10(topNm / 4));
  return [5, 2, 1].map((s) => s * power).find((step) => topNm / step >= 4) ?? power;
}

/**
 * Legend of a thickness map: the ramp with ticks in nm or µm, and the key of what has no thickness. Colours stand in
 * attributes, so it shows under any content security policy.
 * @param topNm thickness at the light end of the ramp
 */
export function legendSvg(topNm: number): SafeHtml {
  const ramp = thicknessRamp();
  const fill = (step: number) => `rgb(${ramp[3 * step]},${ramp[3 * step + 1]},${ramp[3 * step + 2]})`;
  const bars = Array.from({ length: STEPS }, (_, i) => {
    const x = (i * WIDTH) / STEPS;
    const step = Math.round(((i + 0.5) / STEPS) * 255);
    return html`<rect x="${x}" y="0" width="${WIDTH / STEPS + 0.5}" height="${BAR}" fill="${fill(step)}"/>`;
  });
  const stepNm = tickStep(topNm);
  const ticks = Array.from({ length: Math.floor(topNm / stepNm + 1e-9) + 1 }, (_, i) => {
    const nm = i * stepNm;
    const x = (nm / topNm) * WIDTH;
    const anchor = i === 0 ? 'start' : x > WIDTH - 12 ? 'end' : 'middle';
    return html`<path d="M${x} ${BAR}v4" stroke="currentColor"/><text x="${x}" y="${BAR + 14}" text-anchor="${anchor}">${tickText(nm, topNm)}</text>`;
  });
  const keys = mapKeyColours().map(({ name, colours }, i) => {
    const [x, y] = [(i % 2) * (WIDTH / 2), BAR + 36 + Math.floor(i / 2) * 16];
    const half = 12 / colours.length;
    const patches = colours.map(
      (colour, k) =>
        html`<rect x="${x + k * half}" y="${y - 9}" width="${half}" height="10" fill="${colour}"/>`,
    );
    return html`${patches}<rect x="${x}" y="${y - 9}" width="12" height="10" fill="none" stroke="currentColor" stroke-width="0.5"/><text x="${x + 17}" y="${y}">${name}</text>`;
  });
  const height = BAR + 36 + Math.ceil(keys.length / 2) * 16;
  return html`<svg class="report-legend" viewBox="0 0 ${WIDTH} ${height}" role="img" aria-label="Legend: thickness from 0 to ${tickText(topNm, topNm)} ${topNm <= 2000 ? 'nanometres' : 'micrometres'}" font-size="10" fill="currentColor" font-family="system-ui, sans-serif">${bars}${ticks}<text x="${WIDTH}" y="${BAR + 24}" text-anchor="end">${topNm <= 2000 ? 'thickness, nm' : 'thickness, µm'}</text>${keys}</svg>`;
}
