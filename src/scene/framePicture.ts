import type { ThicknessField } from './fields/thicknessField.ts';
import type { FilmTable } from './filmTable.ts';
import { fractalNoise } from './smoothNoise.ts';
import { TRUE_KIND } from './types.ts';

/** Raw camera values (3 a pixel), thickness and kind, row by row from the top left. */
export interface Picture {
  readonly raw: Float32Array;
  readonly thicknessNm: Float32Array;
  readonly kind: Uint8Array;
}

/** Places in shares of the picture's width and height: [left, top, width, height]. */
export type Box = readonly [number, number, number, number];

export interface FramePicture {
  readonly width: number;
  readonly height: number;
  /** Thickness over the unit square inside the frame. */
  readonly field: ThicknessField;
  readonly table: FilmTable;
  readonly incidenceRad: number;
  /** Inside of the wire frame, with corners rounded by this share of its shorter side. */
  readonly frame: Box;
  readonly cornerShare: number;
  /** Grey card beside it, and its reflectance. */
  readonly card: Box;
  readonly cardReflectance: number;
  /** How far the card lies askew, radians. */
  readonly cardTurnRad: number;
  readonly seed: number;
  /** Looks a pixel along each side. */
  readonly subsamples: number;
}

/** Distance outside a rounded box, negative inside; all in pixels. */
function outsideRoundedBox(
  x: number,
  y: number,
  box: readonly [number, number, number, number],
  radius: number,
): number {
  const [left, top, width, height] = box;
  const qx = Math.abs(x - left - width / 2) - width / 2 + radius;
  const qy = Math.abs(y - top - height / 2) - height / 2 + radius;
  return Math.hypot(Math.max(qx, 0), Math.max(qy, 0)) + Math.min(Math.max(qx, qy), 0) - radius;
}

/** A soap film in a wire frame before a dark cloth, a grey card beside it, lit by a wide even source. */
export function renderFrame(picture: FramePicture): Picture {
  const { width, height, subsamples, seed } = picture;
  const inPixels = (box: Box) => [box[0] * width, box[1] * height, box[2] * width, box[3] * height] as const;
  const frame = inPixels(picture.frame);
  const card = inPixels(picture.card);
  const shorter = Math.min(width, height);
  const radius = picture.cornerShare * Math.min(frame[2], frame[3]);
  const wire = Math.max(1.5, 0.008 * shorter);
  const fold = fractalNoise(seed, 3);
  const fibre = fractalNoise(seed + 1, 2);
  const paper = fractalNoise(seed + 2, 2);
  const cos = Math.cos(picture.cardTurnRad);
  const sin = Math.sin(picture.cardTurnRad);
  const out: Picture = {
    raw: new Float32Array(3 * width * height),
    thicknessNm: new Float32Array(width * height).fill(Number.NaN),
    kind: new Uint8Array(width * height),
  };
  const colour = new Float64Array(3);

  const grey = (level: number, r = 1, g = 1, b = 1) => {
    colour[0] = level * r;
    colour[1] = level * g;
    colour[2] = level * b;
  };
  /** Writes the colour seen at a place in pixels; returns the film's thickness or NaN. */
  const look = (x: number, y: number): number => {
    const outside = outsideRoundedBox(x, y, frame, radius);
    if (outside < 0) {
      const nm = picture.field((x - frame[0]) / frame[2], (y - frame[1]) / frame[3]);
      picture.table.lookUp(nm, picture.incidenceRad, colour);
      return nm;
    }
    const onRod = y < frame[1] && Math.abs(x - frame[0] - frame[2] / 2) < 0.7 * wire;
    if (outside < wire || onRod) {
      const across = onRod ? (x - frame[0] - frame[2] / 2) / (0.7 * wire) : 2 * (outside / wire) - 1;
      const round = Math.sqrt(Math.max(0, 1 - across * across));
      const along = 0.65 + 0.8 * Math.max(-0.6, fold((x * 3) / shorter + 9, (y * 3) / shorter));
      const gleam = 0.085 * along * Math.exp(-(((across + 0.3) / 0.25) ** 2));
      grey(0.006 + 0.012 * round + gleam, 1, 0.97, 0.92);
      return Number.NaN;
    }
    const cardX = card[0] + card[2] / 2;
    const cardY = card[1] + card[3] / 2;
    const turned = (px: number, py: number) => {
      const [dx, dy] = [px - cardX, py - cardY];
      return outsideRoundedBox(
        cardX + cos * dx + sin * dy,
        cardY - sin * dx + cos * dy,
        card,
        0.01 * shorter,
      );
    };
    const onCard = turned(x, y);
    if (onCard < 0) {
      grey(picture.cardReflectance * (1 + 0.012 * paper((x * 90) / shorter, (y * 90) / shorter)));
      return Number.NaN;
    }
    const shadow = turned(x - 0.012 * shorter, y - 0.016 * shorter);
    const shade = 0.35 + 0.65 * Math.min(1, Math.max(0, shadow / (0.02 * shorter)));
    const u = x / shorter;
    const v = y / shorter;
    const weave = 0.5 + 0.5 * Math.sin(u * 900) * Math.sin(v * 900);
    // Folds hang slantwise: light catches one flank of each, the other lies in shadow.
    const drape = fold(u * 1.9 + 0.5 * v, v * 0.55 + 3);
    const flank = fold(u * 1.9 + 0.5 * v + 0.05, v * 0.55 + 3) - drape;
    const cloth = 0.9 + 0.9 * drape + 7 * flank + 0.35 * fibre(u * 160, v * 160) + 0.25 * weave;
    grey(0.0022 * shade * Math.max(0.12, cloth), 0.9, 0.95, 1.1);
    return Number.NaN;
  };

  const share = 1 / (subsamples * subsamples);
  for (let row = 0; row < height; row++) {
    for (let column = 0; column < width; column++) {
      const pixel = row * width + column;
      let sum = 0;
      for (let sy = 0; sy < subsamples; sy++) {
        for (let sx = 0; sx < subsamples; sx++) {
          sum += look(column + (sx + 0.5) / subsamples, row + (sy + 0.5) / subsamples);
          for (let c = 0; c < 3; c++) {
            out.raw[3 * pixel + c]! += colour[c]! * share;
          }
        }
      }
      out.thicknessNm[pixel] = sum * share;
      out.kind[pixel] = Number.isNaN(sum) ? TRUE_KIND.other : TRUE_KIND.film;
    }
  }
  return out;
}

/** Oil or bare water seen at one angle all over, filling the picture. */
export function renderFlatWater(
  field: ThicknessField,
  table: FilmTable,
  incidenceRad: number,
  width: number,
  height: number,
): Picture {
  const raw = new Float32Array(3 * width * height);
  const thicknessNm = new Float32Array(width * height);
  const kind = new Uint8Array(width * height);
  const colour = new Float64Array(3);
  for (let row = 0; row < height; row++) {
    for (let column = 0; column < width; column++) {
      const pixel = row * width + column;
      const nm = field((column + 0.5) / width, (row + 0.5) / height);
      table.lookUp(nm, incidenceRad, colour);
      raw.set(colour, 3 * pixel);
      thicknessNm[pixel] = nm;
      kind[pixel] = nm > 0 ? TRUE_KIND.film : TRUE_KIND.bare;
    }
  }
  return { raw, thicknessNm, kind };
}
