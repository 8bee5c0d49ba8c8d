/** A map seen at a slant, laid out on a grid of square metres on the water. */
import type { RingPoint } from './rings.ts';

/** Between picture places (pixels from the top left corner) and the ground (metres); null where there is no such place. */
export interface GroundMapping {
  readonly groundOf: (x: number, y: number) => RingPoint | null;
  readonly placeOf: (xM: number, yM: number) => RingPoint | null;
}

/** Rows run from north to south, columns from west to east; without a heading "north" is ahead and "east" to the right. */
export interface GroundGrid {
  readonly columns: number;
  readonly rows: number;
  /** Outer corner of the top left cell, metres. */
  readonly westM: number;
  readonly northM: number;
  readonly cellM: number;
}

/** A mapping in the camera's frame (right, ahead) as one to east and north, for a camera that looks along `headingDeg` (true). */
export function turnedMapping({ groundOf, placeOf }: GroundMapping, headingDeg: number): GroundMapping {
  const sine = Math.sin((headingDeg * Math.PI) / 180);
  const cosine = Math.cos((headingDeg * Math.PI) / 180);
  return {
    groundOf: (x, y) => {
      const place = groundOf(x, y);
      return place && [place[0] * cosine + place[1] * sine, place[1] * cosine - place[0] * sine];
    },
    placeOf: (eastM, northM) => placeOf(eastM * cosine - northM * sine, northM * cosine + eastM * sine),
  };
}

/** Most cells a grid gets: 4 MB of floats, and a second of work on a phone. */
const MOST_CELLS = 1_000_000;

/**
 * The grid that holds all pixels with an area. Its cells are about as large as the median pixel on the water, on steps of
 * 1, 2 and 5, larger where that would make too many; null where no pixel counts.
 * @param areaM2 water area of each pixel, 0 or NaN where it does not count
 */
export function gridFor(
  areaM2: Float32Array,
  width: number,
  height: number,
  mapping: GroundMapping,
  mostCells = MOST_CELLS,
): GroundGrid | null {
  const box = [Infinity, Infinity, -Infinity, -Infinity] as [number, number, number, number];
  const include = (x: number, y: number) => {
    const place = mapping.groundOf(x, y);
    if (!place) return;
    box[0] = Math.min(box[0], place[0]);
    box[1] = Math.min(box[1], place[1]);
    box[2] = Math.max(box[2], place[0]);
    box[3] = Math.max(box[3], place[1]);
  };
  const sizes: number[] = [];
  const stride = Math.max(1, Math.floor(areaM2.length / 20_000));
  for (let i = 0; i < areaM2.length; i += stride) if (areaM2[i]! > 0) sizes.push(Math.sqrt(areaM2[i]!));
  for (let y = 0; y < height; y++) {
    let first = -1;
    let last = -1;
    for (let x = 0; x < width; x++) {
      if (!(areaM2[y * width + x]! > 0)) continue;
      if (first < 0) first = x;
      last = x;
    }
    if (first < 0) continue;
    // A picture row is a straight line on the water, so its ends are its furthest places.
    for (const edge of [y, y + 1]) {
      include(first, edge);
      include(last + 1, edge);
    }
    if (sizes.length === 0) sizes.push(Math.sqrt(areaM2[y * width + first]!));
  }
  if (!(box[2] > box[0] && box[3] > box[1])) return null;
  sizes.sort((a, b) => a - b);
  const least = Math.sqrt(((box[2] - box[0]) * (box[3] - box[1])) / mostCells);
  for (let cellM = evenStep(Math.max(least, sizes[sizes.length >> 1]!)); ; cellM = evenStep(1.01 * cellM)) {
    // Whole cells from the camera, so that two maps of one place share their grid lines; without binary dust.
    const westM = decimal(cellM * Math.floor(box[0] / cellM));
    const northM = decimal(cellM * Math.ceil(box[3] / cellM));
    const columns = Math.ceil((box[2] - westM) / cellM);
    const rows = Math.ceil((northM - box[1]) / cellM);
    if (columns * rows <= mostCells) return { columns, rows, westM, northM, cellM };
  }
}

function decimal(value: number): number {
  return Number(value.toPrecision(12));
}

/** The step of 1, 2 or 5 times a power of ten at or above `value`. */
function evenStep(value: number): number {
  const power = 10 ** Math.floor(Math.log10(value));
  const step = [1, 2, 5, 10].find((s) => s * power >= value * (1 - 1e-9)) ?? 10;
  return step * power;
}

/** Places looked up along each side of a cell. */
const PER_SIDE = 4;

/**
 * Values of a map on the grid, row by row from the north west: the mean of the pixels seen at 16 places of each cell, NaN
 * where fewer than half of them have a value or lie on pixels that count.
 * @param values one a pixel of the map, NaN where there is none
 * @throws RangeError where values and areas do not fit the size
 */
export function onGround(
  values: Float32Array,
  areaM2: Float32Array,
  width: number,
  height: number,
  mapping: GroundMapping,
  grid: GroundGrid,
): Float32Array {
  if (values.length !== width * height || areaM2.length !== values.length) {
    throw new RangeError(`The map is not ${width} × ${height}.`);
  }
  const out = new Float32Array(grid.columns * grid.rows);
  const step = grid.cellM / PER_SIDE;
  for (let row = 0; row < grid.rows; row++) {
    for (let column = 0; column < grid.columns; column++) {
      let sum = 0;
      let count = 0;
      for (let k = 0; k < PER_SIDE * PER_SIDE; k++) {
        const east = grid.westM + column * grid.cellM + ((k % PER_SIDE) + 0.5) * step;
        const north = grid.northM - row * grid.cellM - (Math.floor(k / PER_SIDE) + 0.5) * step;
        const place = mapping.placeOf(east, north);
        if (!place) continue;
        const x = Math.floor(place[0]);
        const y = Math.floor(place[1]);
        if (x < 0 || y < 0 || x >= width || y >= height) continue;
        const value = values[y * width + x]!;
        if (!(areaM2[y * width + x]! > 0) || Number.isNaN(value)) continue;
        sum += value;
        count++;
      }
      out[row * grid.columns + column] = 2 * count >= PER_SIDE * PER_SIDE ? sum / count : Number.NaN;
    }
  }
  return out;
}
