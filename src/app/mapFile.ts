import type { ThicknessMap } from '../match/types.ts';
import { mapKeyColours, niceTop, paintMap, thicknessRamp } from '../record/thicknessColours.ts';
import { ticksTo } from './reading/ticks.ts';
import { inTurns, pause } from './turns.ts';

/** Largest canvas that phones give, pixels (some stop at 16.7 million). */
const MOST_PIXELS = 16_000_000;
/** Rows painted at once: a multiple of the patterns' period. */
const BAND = 32;
const INK = '#101010';

/** Rows `y` to `y + rows` of a map, sharing its memory. */
function bandOf(map: ThicknessMap, y: number, rows: number): ThicknessMap {
  const cut = <T extends Float32Array | Uint8Array>(values: T) =>
    values.subarray(y * map.width, (y + rows) * map.width) as T;
  return {
    width: map.width,
    height: rows,
    thicknessNm: cut(map.thicknessNm),
    lowNm: cut(map.lowNm),
    highNm: cut(map.highNm),
    order: cut(map.order),
    status: cut(map.status),
  };
}

/** The scale with ticks, the key of what has no thickness, and what the picture is. */
function drawLegend(
  context: CanvasRenderingContext2D,
  { width, top, unit }: { readonly width: number; readonly top: number; readonly unit: number },
  topNm: number,
  foot: string,
): void {
  const ramp = thicknessRamp();
  const edge = unit;
  const length = width - 2 * edge;
  for (let i = 0; i < 256; i++) {
    context.fillStyle = `rgb(${ramp[3 * i]} ${ramp[3 * i + 1]} ${ramp[3 * i + 2]})`;
    context.fillRect(edge + (i * length) / 256, top + unit * 0.6, length / 256 + 1, unit);
  }
  context.fillStyle = INK;
  context.font = `${unit}px system-ui, sans-serif`;
  context.textBaseline = 'top';
  for (const { nm, text } of ticksTo(topNm, 4)) {
    const x = edge + (nm / topNm) * length;
    context.fillRect(x - 1, top + unit * 1.6, 2, unit * 0.4);
    context.textAlign = nm === 0 ? 'left' : nm > 0.9 * topNm ? 'right' : 'center';
    context.fillText(text, x, top + unit * 2.1);
  }
  context.textAlign = 'left';
  let x = edge;
  let y = top + unit * 3.8;
  for (const { name, colours } of mapKeyColours()) {
    const needed = unit * 1.6 + context.measureText(name).width;
    if (x + needed > width - edge && x > edge) {
      x = edge;
      y += unit * 1.5;
    }
    colours.forEach((colour, k) => {
      context.fillStyle = colour;
      context.fillRect(x + (k * unit) / colours.length, y, unit / colours.length, unit);
    });
    context.strokeStyle = INK;
    context.strokeRect(x, y, unit, unit);
    context.fillStyle = INK;
    context.fillText(name, x + unit * 1.4, y);
    x += needed + unit;
  }
  context.fillText(foot, edge, y + unit * 1.7);
}

/**
 * The map with its scale and key, as PNG, at the map's size (shrunk where a phone's canvas would be too small).
 * @throws Error when the browser gives no canvas, with what to do
 */
export async function mapFile(map: ThicknessMap, foot: string): Promise<Blob> {
  const unit = Math.max(9, Math.round(map.width / 44));
  const legendHeight = unit * 10;
  const scale = Math.min(1, Math.sqrt(MOST_PIXELS / (map.width * (map.height + legendHeight))));
  const canvas = document.createElement('canvas');
  canvas.width = Math.floor(map.width * scale);
  canvas.height = Math.floor((map.height + legendHeight) * scale);
  const context = canvas.getContext('2d');
  if (!context) throw new Error('This browser gives no canvas to draw the map on. Take the CSV instead.');
  context.scale(scale, scale);
  context.fillStyle = '#ffffff';
  context.fillRect(0, 0, map.width, map.height + legendHeight);
  await pause();
  const topNm = niceTop(map);
  await pause();
  const breathe = inTurns();
  for (let y = 0; y < map.height; y += BAND) {
    const rows = Math.min(BAND, map.height - y);
    const { rgb } = paintMap(bandOf(map, y, rows), topNm);
    const pixels = new ImageData(map.width, rows);
    for (let i = 0, o = 0; i < rgb.length; i += 3, o += 4) {
      pixels.data[o] = rgb[i] ?? 0;
      pixels.data[o + 1] = rgb[i + 1] ?? 0;
      pixels.data[o + 2] = rgb[i + 2] ?? 0;
      pixels.data[o + 3] = 255;
    }
    if (scale === 1) context.putImageData(pixels, 0, y);
    else {
      const band = await createImageBitmap(pixels);
      context.drawImage(band, 0, y);
      band.close();
    }
    await breathe();
  }
  await pause();
  drawLegend(context, { width: map.width, top: map.height, unit }, topNm, foot);
  return new Promise((resolve, reject) => {
    canvas.toBlob(
      (blob) =>
        blob
          ? resolve(blob)
          : reject(new Error('The map could not be written; free some storage and try again.')),
      'image/png',
    );
  });
}
