import { hashText, type Random } from '../random.ts';
import { fractalNoise, smoothStep } from '../smoothNoise.ts';
import type { ThicknessField } from './thicknessField.ts';

export interface SoapFilmOptions {
  /** Thickness at the top and at the bottom of the frame before plumes, nm. */
  readonly topNm: number;
  readonly bottomNm: number;
  /** Profile power: 0.5 is a rigid film under gravity (Mysels, Shinoda & Frankel 1959), above 1 a mobile one. */
  readonly power: number;
  /** Number of thin patches that rise from the sides and the bottom (marginal regeneration). */
  readonly plumes: number;
  /** Turning cells along the margins, and how far a strong one has turned. */
  readonly swirls: number;
  readonly turnRad: number;
  /** Black film from the top down to this share of the height; 0 for none. */
  readonly blackShare: number;
  readonly blackNm: number;
  /** Width over height of the frame's inside, so that spots of black film are round. */
  readonly aspect: number;
}

/** A draining film as it might be found: thin on top, 5 to 1250 nm in all. */
export function drawSoapFilm(random: Random, black: boolean, aspect: number): SoapFilmOptions {
  return {
    topNm: black ? random.uniform(60, 160) : random.uniform(5, 60),
    bottomNm: random.uniform(850, 1250),
    power: random.uniform(0.9, 1.5),
    plumes: 8 + Math.floor(8 * random.next()),
    swirls: 14 + Math.floor(9 * random.next()),
    turnRad: random.uniform(0.8, 1.4),
    blackShare: black ? random.uniform(0.12, 0.3) : 0,
    blackNm: random.uniform(5, 30),
    aspect,
  };
}

interface Plume {
  readonly x: number;
  readonly y: number;
  readonly length: number;
  readonly width: number;
  readonly lean: number;
  readonly depth: number;
}

function drawPlume(random: Random): Plume {
  const fromSide = random.next() < 0.6;
  const left = random.next() < 0.5;
  const x = fromSide
    ? left
      ? random.uniform(0.01, 0.09)
      : random.uniform(0.91, 0.99)
    : random.uniform(0.1, 0.9);
  const y = fromSide ? random.uniform(0.35, 0.98) : random.uniform(0.9, 1.02);
  return {
    x,
    y,
    length: random.uniform(0.12, 0.3),
    width: random.uniform(0.02, 0.045),
    lean: fromSide ? (left ? random.uniform(0, 0.35) : random.uniform(-0.35, 0)) : random.uniform(-0.2, 0.2),
    depth: random.uniform(0.12, 0.35),
  };
}

/** Share of thickness that a plume takes away at a place: a stalk that widens into a rounded head. */
function plumeDepth(plume: Plume, x: number, y: number): number {
  const rise = (plume.y - y) / plume.length;
  const headHeight = (plume.width * 0.8) / plume.length;
  if (rise < -0.3 - headHeight || rise > 1.15 + 4 * headHeight) {
    return 0;
  }
  const across = x - plume.x - plume.lean * plume.length * Math.max(0, rise);
  const stalk = plume.width * 0.5;
  const stalkPart =
    0.7 *
    Math.exp(-0.5 * (across / stalk) ** 2) *
    smoothStep(-0.3, 0.1, rise) *
    (1 - smoothStep(0.8, 1.15, rise));
  const head = Math.hypot(across / (plume.width * 1.1), (rise - 0.95) / headHeight);
  return plume.depth * Math.min(1, stalkPart + Math.exp(-0.5 * head * head));
}

/** A turning cell: carries the film round its middle, most in the middle (area-preserving). */
interface Swirl {
  readonly x: number;
  readonly y: number;
  readonly radius: number;
  readonly turnRad: number;
}

/** Cells sit along the sides and the bottom, where thin film rises past thick film that sinks. */
function drawSwirl(random: Random, stir: number): Swirl {
  const place = random.next();
  const left = random.next() < 0.5;
  const x =
    place < 0.7 ? (left ? random.uniform(0, 0.16) : random.uniform(0.84, 1)) : random.uniform(0.1, 0.9);
  const y = place < 0.7 ? 0.12 + 0.88 * Math.sqrt(random.next()) : random.uniform(0.82, 1);
  const inwards = left === x < 0.5 ? 1 : -1;
  return {
    x,
    y,
    radius: random.uniform(0.022, 0.06) * (0.6 + 0.6 * y),
    turnRad: inwards * stir * random.uniform(0.5, 1.5),
  };
}

/** Follows a place back through the cells, last one first. */
function unstir(swirls: readonly Swirl[], place: { x: number; y: number }): void {
  for (const swirl of swirls) {
    const dx = place.x - swirl.x;
    const dy = place.y - swirl.y;
    const far = (dx * dx + dy * dy) / (swirl.radius * swirl.radius);
    if (far < 12) {
      const angle = swirl.turnRad * Math.exp(-0.5 * far);
      const cos = Math.cos(angle);
      const sin = Math.sin(angle);
      place.x = swirl.x + cos * dx - sin * dy;
      place.y = swirl.y + sin * dx + cos * dy;
    }
  }
}

/** The thickness of a vertical draining soap film over the unit square (the inside of its frame); never NaN. */
export function soapFilmField(options: SoapFilmOptions, random: Random): ThicknessField {
  const seed = hashText(String(random.next()));
  const sway = fractalNoise(seed, 2);
  const swirls = Array.from({ length: options.swirls }, () => drawSwirl(random, options.turnRad));
  const plumes = Array.from({ length: options.plumes }, () => drawPlume(random));
  const borderNoise = fractalNoise(seed + 13, 3);
  const spots = Array.from({ length: options.blackShare > 0 ? 5 : 0 }, () => ({
    x: random.uniform(0.1, 0.9),
    y: options.blackShare + random.uniform(0.02, 0.09),
    radius: random.uniform(0.008, 0.025),
  }));
  const place = { x: 0, y: 0 };

  return (x, y) => {
    if (options.blackShare > 0) {
      const border = options.blackShare + 0.02 * borderNoise(x * 3, 0.5) + 0.01 * borderNoise(x * 9, 3.5);
      const inSpot = spots.some(
        (spot) => Math.hypot((x - spot.x) * options.aspect, y - spot.y) < spot.radius,
      );
      if (y < border || inSpot) {
        return Math.max(5, options.blackNm * (1 + 0.05 * borderNoise(x * 2, y * 2)));
      }
    }
    place.x = x;
    place.y = y;
    unstir(swirls, place);
    place.y += 0.035 * sway(place.x * 2.2, place.y * 1.3);
    const depth = Math.min(1, Math.max(0, (place.y - options.blackShare) / (1 - options.blackShare)));
    let nm = options.topNm + (options.bottomNm - options.topNm) * depth ** options.power;
    let left = 1;
    for (const plume of plumes) {
      left *= 1 - plumeDepth(plume, place.x, place.y);
    }
    nm *= left;
    return Math.min(1250, Math.max(5, nm));
  };
}
