import type { Point, Rectangle, Setup } from '../../engine/setup.ts';
import type { MarkKind } from '../state.ts';
import { drawLeftOut } from './drawLeftOut.ts';
import { drawView, type ViewDrawing } from './drawView.ts';
import { type MarkId, sameMark } from './grips.ts';
import { toScreen, type View } from './viewTransform.ts';

export interface StagePicture {
  readonly photo: ImageBitmap;
  /** Measured size: marks are in these pixels. */
  readonly width: number;
  readonly height: number;
  readonly map: ImageBitmap | null;
  readonly wipe: number;
  readonly setup: Setup;
  /** Marks are put away while the map is read. */
  readonly showMarks: boolean;
  readonly selected: MarkId | null;
  /** Kind of mark whose handles are shown. */
  readonly handles: MarkKind | null;
  readonly probeAt: Point | null;
  /** Rectangle or corner list being drawn. */
  readonly draft: { readonly rectangle?: Rectangle; readonly corners?: readonly Point[] } | null;
  readonly loupeAt: Point | null;
  /** Horizon, distances and bands of the view step. */
  readonly viewDrawing: ViewDrawing | null;
}

const COLOURS = { clean: '#7fd6ff', white: '#ffffff', dark: '#ffb4a8' } as const;
const LABELS = { clean: 'clean', white: 'card', dark: 'dark' } as const;

/** Draws photo, map, marks, probe and loupe. */
export function drawStage(
  context: CanvasRenderingContext2D,
  view: View,
  picture: StagePicture,
  width: number,
  height: number,
): void {
  context.clearRect(0, 0, width, height);
  context.imageSmoothingEnabled = view.scale < 3;
  const [left, top] = toScreen(view, 0, 0);
  const w = picture.width * view.scale;
  const h = picture.height * view.scale;
  context.drawImage(picture.photo, left, top, w, h);
  if (picture.map && picture.wipe < 1) {
    const from = width * picture.wipe;
    context.save();
    context.beginPath();
    context.rect(from, 0, width - from, height);
    context.clip();
    context.drawImage(picture.map, left, top, w, h);
    context.restore();
    if (picture.wipe > 0) {
      context.fillStyle = '#fff';
      context.fillRect(from - 1, 0, 2, height);
    }
  }
  if (picture.showMarks) {
    drawLeftOut(context, view, picture, picture.setup, width, height);
    drawMarks(context, view, picture);
  }
  if (picture.viewDrawing) drawView(context, view, picture, picture.viewDrawing);
  if (picture.probeAt) drawProbe(context, view, picture.probeAt);
  if (picture.loupeAt) drawLoupe(context, view, picture, picture.loupeAt, width);
}

function outline(context: CanvasRenderingContext2D, path: () => void, colour: string, width = 2): void {
  context.lineWidth = width + 3;
  context.strokeStyle = 'rgba(0,0,0,.65)';
  path();
  context.stroke();
  context.lineWidth = width;
  context.strokeStyle = colour;
  path();
  context.stroke();
}

/** Half the side of a handle, CSS pixels: what is seen; what can be touched is larger. */
const HANDLE = 7;

function drawMarks(
  context: CanvasRenderingContext2D,
  view: View,
  { setup, draft, selected, handles }: StagePicture,
): void {
  const handle = (x: number, y: number, colour: string) => {
    context.beginPath();
    context.roundRect(x - HANDLE, y - HANDLE, 2 * HANDLE, 2 * HANDLE, 4);
    context.fillStyle = colour;
    context.fill();
    context.lineWidth = 2;
    context.strokeStyle = 'rgba(0,0,0,.75)';
    context.stroke();
  };
  const rectangle = (r: Rectangle, colour: string, label: string) => {
    const [x, y] = toScreen(view, r[0], r[1]);
    outline(
      context,
      () => {
        context.beginPath();
        context.rect(x, y, r[2] * view.scale, r[3] * view.scale);
      },
      colour,
    );
    context.font = '600 13px system-ui';
    context.lineWidth = 3;
    context.strokeStyle = 'rgba(0,0,0,.8)';
    context.strokeText(label, x + 2, y - 6);
    context.fillStyle = colour;
    context.fillText(label, x + 2, y - 6);
  };
  for (const kind of ['clean', 'white', 'dark'] as const) {
    const r = setup.references?.[kind];
    if (!r) continue;
    rectangle(r, COLOURS[kind], LABELS[kind]);
    if (!sameMark(selected, { kind })) continue;
    for (const px of [r[0], r[0] + r[2]]) {
      for (const py of [r[1], r[1] + r[3]]) handle(...toScreen(view, px, py), COLOURS[kind]);
    }
  }
  const polygon = (points: readonly Point[], close: boolean) =>
    outline(
      context,
      () => {
        context.beginPath();
        points.forEach((p, i) => {
          const [x, y] = toScreen(view, p[0], p[1]);
          if (i === 0) context.moveTo(x, y);
          else context.lineTo(x, y);
        });
        if (close) context.closePath();
      },
      '#ffe08a',
    );
  if (setup.region) polygon(setup.region, true);
  if (setup.region && handles === 'region')
    for (const at of setup.region) handle(...toScreen(view, at[0], at[1]), '#ffe08a');
  if (draft?.corners && draft.corners.length > 0) polygon(draft.corners, false);
  if (draft?.rectangle) rectangle(draft.rectangle, '#ffe08a', '');
  setup.pins?.forEach((pin, index) => {
    const [x, y] = toScreen(view, pin.at[0], pin.at[1]);
    const isSelected = sameMark(selected, { kind: 'pin', index });
    context.beginPath();
    context.arc(x, y, 12, 0, 2 * Math.PI);
    context.fillStyle = isSelected ? '#ffe08a' : 'rgba(6,10,11,.8)';
    context.fill();
    context.lineWidth = 2;
    context.strokeStyle = isSelected ? 'rgba(0,0,0,.75)' : '#ffe08a';
    context.stroke();
    context.fillStyle = isSelected ? '#060a0b' : '#ffe08a';
    context.font = '700 14px system-ui';
    context.textAlign = 'center';
    context.fillText(pin.is === 'bare' ? '0' : String(pin.order), x, y + 5);
    context.textAlign = 'start';
  });
}

function drawProbe(context: CanvasRenderingContext2D, view: View, at: Point): void {
  const [x, y] = toScreen(view, at[0] + 0.5, at[1] + 0.5);
  outline(
    context,
    () => {
      context.beginPath();
      context.arc(x, y, 13, 0, 2 * Math.PI);
      context.moveTo(x - 22, y);
      context.lineTo(x - 7, y);
      context.moveTo(x + 7, y);
      context.lineTo(x + 22, y);
      context.moveTo(x, y - 22);
      context.lineTo(x, y - 7);
      context.moveTo(x, y + 7);
      context.lineTo(x, y + 22);
    },
    '#fff',
  );
}

/** A magnified patch beside the finger, so that the place under it can be seen. */
function drawLoupe(
  context: CanvasRenderingContext2D,
  view: View,
  picture: StagePicture,
  at: Point,
  width: number,
): void {
  const radius = 56;
  const [fingerX] = toScreen(view, at[0], at[1]);
  const x = fingerX < width / 2 ? width - radius - 12 : radius + 12;
  const y = radius + 76;
  const magnified = Math.max(4, view.scale * 3);
  const toBitmap = picture.photo.width / picture.width;
  const reach = (radius / magnified) * toBitmap;
  context.save();
  context.beginPath();
  context.arc(x, y, radius, 0, 2 * Math.PI);
  context.clip();
  context.imageSmoothingEnabled = false;
  context.fillStyle = '#000';
  context.fillRect(x - radius, y - radius, 2 * radius, 2 * radius);
  context.drawImage(
    picture.photo,
    at[0] * toBitmap - reach,
    at[1] * toBitmap - reach,
    2 * reach,
    2 * reach,
    x - radius,
    y - radius,
    2 * radius,
    2 * radius,
  );
  context.restore();
  outline(
    context,
    () => {
      context.beginPath();
      context.arc(x, y, radius, 0, 2 * Math.PI);
      context.moveTo(x - 8, y);
      context.lineTo(x + 8, y);
      context.moveTo(x, y - 8);
      context.lineTo(x, y + 8);
    },
    '#fff',
  );
}
