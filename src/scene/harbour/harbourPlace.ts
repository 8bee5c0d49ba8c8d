import { drawOilSheen, oilSheenField } from '../fields/oilSheen.ts';
import type { ThicknessField } from '../fields/thicknessField.ts';
import { focalPxFrom35mm, incidenceRad, lookAlong, type PinholeView, viewAxes } from '../perspective.ts';
import type { Random } from '../random.ts';
import { drawRipples, type Ripples } from './ripples.ts';
import { buildSurroundings, type Surroundings } from './solids.ts';
import type { Spot } from './waterView.ts';

/** An invented harbour corner: where the camera stands, what is there and where the oil lies. */
export interface HarbourPlace {
  readonly view: PinholeView;
  readonly focal35mm: number;
  readonly field: ThicknessField;
  readonly surroundings: Surroundings;
  readonly ripples: Ripples;
  readonly spots: readonly Spot[];
  readonly sun: { readonly direction: readonly [number, number, number]; readonly cosine: number };
  /** Middle of the water kept free of oil, and its half width, metres. */
  readonly bare: readonly [number, number, number];
  /** Face of the quay: water lies to the right of this X. */
  readonly quayX: number;
}

const DEG = Math.PI / 180;

export interface HarbourPlaceOptions {
  readonly widthPx: number;
  readonly heightPx: number;
  /** Clouds and brightening towards the zenith, which a reader's model does not have; 0 for an even sky. */
  readonly skyUnevenness: number;
  readonly rippleWaves: number;
}

/** Draws a place. The picture is upright (portrait) for a phone held in one hand, but any size works. */
export function drawHarbourPlace(options: HarbourPlaceOptions, random: Random): HarbourPlace {
  const draw = random.fork('place');
  const focal35mm = 26;
  const view: PinholeView = {
    widthPx: options.widthPx,
    heightPx: options.heightPx,
    focalPx: focalPxFrom35mm(focal35mm, options.widthPx, options.heightPx),
    heightM: draw.uniform(2.2, 3.1),
    pitchRad: draw.uniform(-31, -26.5) * DEG,
    rollRad: draw.uniform(-1.5, 1.5) * DEG,
  };
  const quayX = draw.uniform(-0.9, -0.65);
  const windRad = draw.uniform(0.9, 1.4);
  const oilRad = draw.uniform(0.35, 0.65);
  // Close enough to be seen at 36 to 42 degrees, where the water's own brightness hardly depends on the angle.
  const bare: [number, number, number] = [
    draw.uniform(0.75, 1.15),
    view.heightM * draw.uniform(0.73, 0.9),
    0.3,
  ];
  // The sheen's own axes run along `oilRad` through a point ahead of the camera, so streamers lie askew.
  const cos = Math.cos(oilRad);
  const sin = Math.sin(oilRad);
  const along = (x: number, y: number) => cos * x + sin * (y - 4);
  const across = (x: number, y: number) => 4 - sin * x + cos * (y - 4);
  const sheen = oilSheenField(
    {
      ...drawOilSheen(draw),
      bareShare: draw.uniform(0.3, 0.5),
      scale: draw.uniform(0.45, 0.65),
      stretch: draw.uniform(1.8, 2.4),
      holes: 0.4,
      keepBare: [along(bare[0], bare[1]), across(bare[0], bare[1]), bare[2] * 1.25],
      box: [-1, 1.5, 4.5, 7],
    },
    random.fork('oil'),
  );
  const sun: [number, number, number] = [0.33, 0.84, 0.43];
  const length = Math.hypot(...sun);
  return {
    view,
    focal35mm,
    field: (x, y) => sheen(along(x, y), across(x, y)),
    surroundings: buildSurroundings(
      {
        quayX,
        quayTopM: 1.05,
        farY: 46,
        farWallToX: 4,
        posts: [
          { x: 2.1, y: 6.4, radiusM: 0.15, footM: -0.1, topM: 1.25, made: 'wood' },
          { x: quayX - 0.5, y: 4.6, radiusM: 0.13, footM: 1, topM: 1.4, made: 'iron' },
        ],
        boom: { from: [quayX, 11.5], to: [9, 9.4] },
        hull: [6.5, 24, 7.5],
        skyGradient: 0.25 * options.skyUnevenness,
        cloud: 0.12 * options.skyUnevenness,
      },
      random.fork('surroundings'),
    ),
    ripples: drawRipples(random.fork('ripples'), 0.02, windRad, options.rippleWaves),
    spots: drawSpots(random.fork('spots'), quayX, bare),
    sun: { direction: [sun[0] / length, sun[1] / length, sun[2] / length], cosine: Math.cos(1.2 * DEG) },
    bare,
    quayX,
  };
}

/** Foam specks in small groups, and bits of driftwood. */
function drawSpots(random: Random, quayX: number, bare: readonly [number, number, number]): Spot[] {
  const spots: Spot[] = [];
  const add = (x: number, y: number, radiusM: number, raw: readonly [number, number, number]) => {
    if (x > quayX + 0.05 && Math.hypot(x - bare[0], y - bare[1]) > bare[2] + 0.1) {
      spots.push({ x, y, radiusM, raw });
    }
  };
  for (let group = 0; group < 9; group++) {
    const gx = random.uniform(-0.5, 3.5);
    const gy = random.uniform(1.8, 8);
    for (let i = 0; i < 5; i++) {
      const level = random.uniform(0.12, 0.26);
      add(gx + 0.12 * random.normal(), gy + 0.12 * random.normal(), random.uniform(0.006, 0.018), [
        level,
        level,
        0.97 * level,
      ]);
    }
  }
  for (let stick = 0; stick < 4; stick++) {
    const x = random.uniform(-0.4, 3);
    const y = random.uniform(2.2, 7);
    const turn = random.uniform(0, Math.PI);
    for (let i = -6; i <= 6; i++) {
      add(x + 0.022 * i * Math.cos(turn), y + 0.022 * i * Math.sin(turn), 0.016, [0.035, 0.024, 0.014]);
    }
  }
  return spots;
}

/** Where a point on the water appears, in pixels from the top left; null behind the camera. */
export function waterToPixel(view: PinholeView, x: number, y: number): [number, number] | null {
  const { right, up, ahead } = viewAxes(view);
  const p = [x, y, -view.heightM];
  const dot = (axis: readonly [number, number, number]) =>
    axis[0] * p[0]! + axis[1] * p[1]! + axis[2] * p[2]!;
  const depth = dot(ahead);
  if (depth <= 0) {
    return null;
  }
  return [
    view.widthPx / 2 + (view.focalPx * dot(right)) / depth,
    view.heightPx / 2 - (view.focalPx * dot(up)) / depth,
  ];
}

/**
 * The part of the picture a person would mark: water seen at less than `steepestDeg` from the vertical, right of the quay
 * by a hand's breadth; where `nearestDeg` is given, no nearer than that. A polygon in whole pixels within the picture.
 */
export function waterRegion(
  view: PinholeView,
  quayX: number,
  steepestDeg: number,
  nearestDeg = 0,
): [number, number][] {
  const { widthPx: width, heightPx: height } = view;
  const ray = [0, 0, 0];
  const axes = viewAxes(view);
  const ground = (px: number, py: number): readonly [number, number] => {
    lookAlong(view, axes, px, py, ray);
    const t = -view.heightM / ray[2]!;
    return [t * ray[0]!, t * ray[1]!];
  };
  /** Lowest row whose middle looks at an incidence of at least `deg`; rows go down towards the camera's feet. */
  const rowAt = (deg: number, column: number) => {
    let [low, high] = [0, height];
    for (let i = 0; i < 40; i++) {
      const middle = (low + high) / 2;
      lookAlong(view, axes, column, middle, ray);
      if (incidenceRad(ray) > deg * DEG) {
        low = middle;
      } else {
        high = middle;
      }
    }
    return high;
  };
  // Both corners of the far side must be near enough, whichever way the picture is turned.
  const top = Math.ceil(Math.max(rowAt(steepestDeg, width), rowAt(steepestDeg, width / 2)));
  const bottom = Math.floor(Math.min(height, rowAt(nearestDeg, width / 2)));
  const left = [0, 0.25, 0.5, 0.75, 1].map((share): [number, number] => {
    const py = Math.round(top + (bottom - top) * share);
    let [low, high] = [0, width];
    for (let i = 0; i < 40; i++) {
      const middle = (low + high) / 2;
      if (ground(middle, py)[0] < quayX + 0.12) {
        low = middle;
      } else {
        high = middle;
      }
    }
    return [Math.round(high), py];
  });
  return [[width, top], ...left, [width, bottom]];
}
