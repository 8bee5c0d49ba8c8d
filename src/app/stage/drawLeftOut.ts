import type { Setup } from '../../engine/setup.ts';
import { leavesOut } from './brush.ts';
import { toScreen, type View } from './viewTransform.ts';

/** Side of the hatching's square, device pixels of a screen of ratio 2. */
const HATCH = 16;

let sheet: HTMLCanvasElement | null = null;
let hatch: CanvasPattern | null = null;

/** Slanted lines, light over dark, so that they show on any photo. */
function hatchOf(context: CanvasRenderingContext2D): CanvasPattern | null {
  if (hatch) return hatch;
  const tile = document.createElement('canvas');
  tile.width = HATCH;
  tile.height = HATCH;
  const ink = tile.getContext('2d');
  if (!ink) return null;
  ink.fillStyle = 'rgba(6,10,11,.45)';
  ink.fillRect(0, 0, HATCH, HATCH);
  ink.strokeStyle = 'rgba(255,255,255,.6)';
  ink.lineWidth = 2;
  ink.beginPath();
  // Three lines, so that those cut at two corners meet those of the next tile.
  for (const shift of [-HATCH, 0, HATCH]) {
    ink.moveTo(shift - 2, HATCH + 2);
    ink.lineTo(shift + HATCH + 2, -2);
  }
  ink.stroke();
  hatch = context.createPattern(tile, 'repeat');
  return hatch;
}

/**
 * Hatches what region and brush leave out: the same rules as `engine/leftOut.ts`, drawn instead of counted.
 * @param width @param height of the stage, CSS pixels
 */
export function drawLeftOut(
  context: CanvasRenderingContext2D,
  view: View,
  photo: { readonly width: number; readonly height: number },
  setup: Setup,
  width: number,
  height: number,
): void {
  if (!leavesOut(setup)) return;
  sheet ??= document.createElement('canvas');
  const ratio = context.getTransform().a;
  if (sheet.width !== context.canvas.width) sheet.width = context.canvas.width;
  if (sheet.height !== context.canvas.height) sheet.height = context.canvas.height;
  const ink = sheet.getContext('2d');
  if (!ink) return;
  const { region, strokes = [] } = setup;
  const polygon = region && region.length >= 3 ? region : null;
  const [left, top] = toScreen(view, 0, 0);
  ink.setTransform(ratio, 0, 0, ratio, 0, 0);
  ink.globalCompositeOperation = 'source-over';
  // The last frame ended with the hatching as its ink.
  ink.fillStyle = '#000';
  ink.clearRect(0, 0, width, height);
  ink.save();
  ink.beginPath();
  ink.rect(left, top, photo.width * view.scale, photo.height * view.scale);
  ink.clip();
  ink.lineCap = 'round';
  ink.lineJoin = 'round';
  if (polygon || strokes[0]?.paint === 'in') ink.fillRect(0, 0, width, height);
  if (polygon) {
    ink.globalCompositeOperation = 'destination-out';
    ink.beginPath();
    for (const at of polygon) ink.lineTo(...toScreen(view, at[0], at[1]));
    ink.fill('evenodd');
  }
  for (const { paint, points, widthPx } of strokes) {
    ink.globalCompositeOperation = paint === 'in' ? 'destination-out' : 'source-over';
    ink.lineWidth = widthPx * view.scale;
    ink.beginPath();
    for (const at of points) ink.lineTo(...toScreen(view, at[0], at[1]));
    const [first] = points;
    if (points.length === 1 && first) ink.lineTo(...toScreen(view, first[0], first[1]));
    ink.stroke();
  }
  ink.restore();
  const pattern = hatchOf(ink);
  if (!pattern) return;
  ink.setTransform(1, 0, 0, 1, 0, 0);
  ink.globalCompositeOperation = 'source-in';
  ink.fillStyle = pattern;
  ink.fillRect(0, 0, sheet.width, sheet.height);
  context.drawImage(sheet, 0, 0, width, height);
}
