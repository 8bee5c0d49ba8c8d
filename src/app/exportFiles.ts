import type { EstimateResult } from '../engine/contract.ts';
import type { Setup } from '../engine/setup.ts';

/** Version of the app, from package.json at build time. */
declare const __APP_VERSION__: string;

/** Hands a file to the person. */
export function hand(name: string, content: Blob): void {
  const link = document.createElement('a');
  link.href = URL.createObjectURL(content);
  link.download = name;
  link.click();
  setTimeout(() => URL.revokeObjectURL(link.href), 10_000);
}

/** Summary as JSON: set-up, counts, quantiles, fit, notices, versions. Position is left out. */
export function summaryFile(
  setup: Setup,
  { summary }: EstimateResult,
  photo: { readonly name: string; readonly sha256: string },
): Blob {
  const content = {
    tintfathom: __APP_VERSION__,
    photo,
    setup,
    ...summary,
    indicative: 'Indicative only: the responsible authority decides.',
  };
  return new Blob([`${JSON.stringify(content, null, 2)}\n`], { type: 'application/json' });
}

/** Thickness by row as CSV (RFC 4180): median and 90 % interval ends of the row's measured pixels. */
export function rowsFile({ map }: EstimateResult): Blob {
  const lines = ['row_px,pixels_measured,thickness_median_nm,low_median_nm,high_median_nm'];
  for (let y = 0; y < map.height; y++) {
    const at: number[] = [];
    for (let x = 0; x < map.width; x++) {
      const i = y * map.width + x;
      if (!Number.isNaN(map.thicknessNm[i] ?? Number.NaN)) at.push(i);
    }
    if (at.length === 0) continue;
    const median = (values: Float32Array) => {
      const sorted = at.map((i) => values[i] ?? 0).sort((a, b) => a - b);
      return (sorted[sorted.length >> 1] ?? 0).toFixed(1);
    };
    lines.push([y, at.length, median(map.thicknessNm), median(map.lowNm), median(map.highNm)].join(','));
  }
  return new Blob([`${lines.join('\r\n')}\r\n`], { type: 'text/csv' });
}

/** The map with its legend as PNG. */
export async function mapFile({ map }: EstimateResult): Promise<Blob> {
  const { paintMap, thicknessRamp } = await import('../record/thicknessColours.ts');
  const { rgb, topNm } = paintMap(map);
  const ramp = thicknessRamp();
  const band = Math.max(64, Math.round(map.height * 0.06));
  const canvas = document.createElement('canvas');
  canvas.width = map.width;
  canvas.height = map.height + band;
  const context = canvas.getContext('2d');
  if (!context) throw new Error('This browser gives no canvas to draw the map on.');
  const pixels = context.createImageData(map.width, map.height);
  for (let i = 0, o = 0; i < rgb.length; i += 3, o += 4) {
    pixels.data[o] = rgb[i] ?? 0;
    pixels.data[o + 1] = rgb[i + 1] ?? 0;
    pixels.data[o + 2] = rgb[i + 2] ?? 0;
    pixels.data[o + 3] = 255;
  }
  context.putImageData(pixels, 0, 0);
  context.fillStyle = '#fff';
  context.fillRect(0, map.height, map.width, band);
  const step = map.width / 256;
  for (let i = 0; i < 256; i++) {
    context.fillStyle = `rgb(${ramp[3 * i]} ${ramp[3 * i + 1]} ${ramp[3 * i + 2]})`;
    context.fillRect(i * step, map.height, step + 1, band * 0.4);
  }
  context.fillStyle = '#000';
  context.font = `${Math.round(band * 0.34)}px system-ui`;
  context.textBaseline = 'bottom';
  context.fillText('0', 4, map.height + band - 4);
  const end = `${topNm} nm · indicative · Tintfathom ${__APP_VERSION__}`;
  context.textAlign = 'right';
  context.fillText(end, map.width - 4, map.height + band - 4);
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
