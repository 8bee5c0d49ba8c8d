/**
 * Draws the app's own pictures: `npx tsx src/cli/makeArtwork.ts` writes the icons from `public/icons/icon.svg`, and the
 * band of a soap film's colours on the first screen from our own chart.
 */
import { readFileSync, writeFileSync } from 'node:fs';
import sharp from 'sharp';
import { chartFor } from '../engine/chartFor.ts';

const ICONS = 'public/icons/';
/** Thickest film of the band, nm: five orders, as far as colour is strong. */
const BAND_END_NM = 1000;
const BAND_STEP_NM = 4;
/** A maskable icon may be cut to a circle of 80 % of its side: the drawing shrinks into it. */
const MASKABLE_SHARE = 0.72;
const GROUND = '#10191b';

async function drawIcons(): Promise<void> {
  const svg = readFileSync(`${ICONS}icon.svg`);
  for (const side of [192, 512]) await sharp(svg).resize(side).png().toFile(`${ICONS}icon-${side}.png`);
  // Even, so that the margins are whole pixels.
  const inner = 2 * Math.round(256 * MASKABLE_SHARE);
  const edge = (512 - inner) / 2;
  await sharp(await sharp(svg).resize(inner).png().toBuffer())
    .extend({ top: edge, bottom: edge, left: edge, right: edge, background: GROUND })
    .flatten({ background: GROUND })
    .png()
    .toFile(`${ICONS}icon-maskable-512.png`);
}

/** Colours of a draining soap film under daylight, thin to thick from left to right, as an eye sees them. */
function drawBand(): void {
  const chart = chartFor({ film: 'soap', camera: 'cie1931', light: { daylightK: 6500 } }, BAND_END_NM);
  const stops: string[] = [];
  for (let nm = 0; nm <= BAND_END_NM; nm += BAND_STEP_NM) {
    const at = 3 * Math.min(chart.count - 1, Math.round(nm / chart.stepNm));
    const hex = [0, 1, 2].map((c) => (chart.displayRgb[at + c] ?? 0).toString(16).padStart(2, '0')).join('');
    stops.push(`<stop offset="${((100 * nm) / BAND_END_NM).toFixed(1)}%" stop-color="#${hex}"/>`);
  }
  writeFileSync(
    `${ICONS}film-band.svg`,
    `<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 1000 100" preserveAspectRatio="none"><linearGradient id="film">${stops.join('')}</linearGradient><rect width="1000" height="100" fill="url(#film)"/></svg>\n`,
  );
}

await drawIcons();
drawBand();
