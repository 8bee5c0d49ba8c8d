import type { PhotoPixels } from '../photo/types.ts';
import { type ActivityMap, BLOCK_SIDE } from './activity.ts';
import { type CodeChart, searchable } from './codeChart.ts';
import { type ColourTable, makeColourTable } from './colourTable.ts';
import { posteriorReader } from './posterior.ts';

/** Reads pixels of one photo: the record of a pixel's colour, in the table of its activity class. */
export interface PixelReader {
  /** Looks pixel (x, y) up; `records` then holds its modes from the offset returned (see `ColourTable`). */
  readonly lookUp: (x: number, y: number) => number;
  records: Float32Array;
  /** Distinct colours met so far, all classes. */
  readonly colours: () => number;
}

/**
 * Makes a reader.
 * @param activity of the photo, judged once by `activityMap`
 * @param charts one chart for each activity class, calmest first
 */
export function makePixelReader(
  pixels: Omit<PhotoPixels, 'encoding'>,
  activity: ActivityMap,
  charts: readonly CodeChart[],
): PixelReader {
  const { codes, channels, width, maxCode } = pixels;
  const levels = maxCode === 255 ? 256 : 1024;
  const shift = maxCode === 255 ? 0 : 6;
  const tables: ColourTable[] = charts.map((chart) =>
    makeColourTable(levels, posteriorReader(searchable(chart))),
  );
  const reader: PixelReader = {
    records: new Float32Array(0),
    lookUp: (x, y) => {
      const at = (y * width + x) * channels;
      const block = ((y / BLOCK_SIDE) | 0) * activity.columns + ((x / BLOCK_SIDE) | 0);
      const table = tables[activity.classOf[block]!]!;
      const offset = table.lookUp(codes[at]! >> shift, codes[at + 1]! >> shift, codes[at + 2]! >> shift);
      reader.records = table.records();
      return offset;
    },
    colours: () => tables.reduce((sum, table) => sum + table.colours(), 0),
  };
  return reader;
}
