import { PIXEL_STATUS, type ThicknessMap } from '../match/types.ts';

/** Film thickness against place along a line through the photo. Places without an answer hold NaN. */
export interface Profile {
  /** Along the line in pixels, from its start; for rows, from the top edge of the photo. */
  readonly placePx: Float64Array;
  readonly thicknessNm: Float64Array;
  /**
   * Means of the pixels' own interval ends: the errors of neighbours are mostly common (camera fit, index), so averaging
   * does not shrink them.
   */
  readonly lowNm: Float64Array;
  readonly highNm: Float64Array;
  /** Standard deviation of thickness among the averaged pixels: what really varies there, with the noise. */
  readonly spreadNm: Float64Array;
  readonly pixels: Float64Array;
}

export interface RowsOptions {
  readonly fromRow?: number;
  readonly toRow?: number;
  readonly fromColumn?: number;
  readonly toColumn?: number;
  /** Rows averaged into one place. */
  readonly rowsPerPlace?: number;
}

/**
 * Averages over rows: thickness against height for a film in a frame. Black film (label 0) counts as thickness 0; pixels
 * past the resolvable range and without film colour do not count.
 * @throws RangeError where the rows or columns are not in the map
 */
export function profileByRows(map: ThicknessMap, options: RowsOptions = {}): Profile {
  const { fromRow = 0, toRow = map.height, fromColumn = 0, toColumn = map.width, rowsPerPlace = 1 } = options;
  if (
    !(fromRow >= 0 && fromRow < toRow && toRow <= map.height) ||
    !(fromColumn >= 0 && fromColumn < toColumn && toColumn <= map.width) ||
    !(rowsPerPlace >= 1)
  ) {
    throw new RangeError(`The rows and columns must lie in the map of ${map.width} × ${map.height} pixels.`);
  }
  const places = Math.ceil((toRow - fromRow) / rowsPerPlace);
  const sums = newSums(places);
  for (let row = fromRow; row < toRow; row++) {
    const place = Math.floor((row - fromRow) / rowsPerPlace);
    for (let column = fromColumn; column < toColumn; column++) {
      add(sums, place, map, row * map.width + column);
    }
  }
  return finish(sums, (place) => {
    const first = fromRow + place * rowsPerPlace;
    return (first + Math.min(first + rowsPerPlace, toRow)) / 2;
  });
}

/**
 * Thickness along a line between two picture places, averaged over `bandPx` pixels across it, one place a pixel.
 * Samples that fall off the photo are left out.
 * @throws RangeError where the two places are one
 */
export function profileAlongLine(
  map: ThicknessMap,
  from: readonly [number, number],
  to: readonly [number, number],
  bandPx = 1,
): Profile {
  const lengthPx = Math.hypot(to[0] - from[0], to[1] - from[1]);
  if (!(lengthPx >= 1)) {
    throw new RangeError('The two ends of the line must lie at least one pixel apart.');
  }
  const alongX = (to[0] - from[0]) / lengthPx;
  const alongY = (to[1] - from[1]) / lengthPx;
  const sums = newSums(Math.ceil(lengthPx));
  for (let place = 0; place < sums.pixels.length; place++) {
    for (let across = 0; across < bandPx; across++) {
      const off = across - (bandPx - 1) / 2;
      const x = Math.floor(from[0] + (place + 0.5) * alongX - off * alongY);
      const y = Math.floor(from[1] + (place + 0.5) * alongY + off * alongX);
      if (x >= 0 && x < map.width && y >= 0 && y < map.height) {
        add(sums, place, map, y * map.width + x);
      }
    }
  }
  return finish(sums, (place) => place + 0.5);
}

interface Sums {
  readonly mean: Float64Array;
  readonly squares: Float64Array;
  readonly low: Float64Array;
  readonly high: Float64Array;
  readonly pixels: Float64Array;
}

function newSums(places: number): Sums {
  const zeros = () => new Float64Array(places);
  return { mean: zeros(), squares: zeros(), low: zeros(), high: zeros(), pixels: zeros() };
}

function add(sums: Sums, place: number, map: ThicknessMap, pixel: number): void {
  const status = map.status[pixel]!;
  const bare = status === PIXEL_STATUS.bare;
  if (!bare && status !== PIXEL_STATUS.measured && status !== PIXEL_STATUS.ambiguous) {
    return;
  }
  const thickness = bare ? 0 : map.thicknessNm[pixel]!;
  const count = ++sums.pixels[place]!;
  const step = thickness - sums.mean[place]!;
  sums.mean[place]! += step / count;
  sums.squares[place]! += step * (thickness - sums.mean[place]!);
  // Maps may leave the interval of bare pixels out.
  sums.low[place]! += bare ? 0 : map.lowNm[pixel]!;
  sums.high[place]! += bare && !(map.highNm[pixel]! > 0) ? 0 : map.highNm[pixel]!;
}

function finish(sums: Sums, placeOf: (place: number) => number): Profile {
  const { pixels } = sums;
  const per = (values: Float64Array) => values.map((value, place) => value / pixels[place]!);
  return {
    placePx: pixels.map((_, place) => placeOf(place)),
    thicknessNm: sums.mean.map((value, place) => (pixels[place]! > 0 ? value : Number.NaN)),
    lowNm: per(sums.low),
    highNm: per(sums.high),
    spreadNm: sums.squares.map((value, place) => Math.sqrt(value / pixels[place]!)),
    pixels,
  };
}
