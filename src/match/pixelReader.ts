import type { PhotoPixels } from '../photo/types.ts';
import { type ActivityMap, BLOCK_SIDE } from './activity.ts';
import { type AngleCharts, angleCursor, type CosineAt } from './angleCharts.ts';
import { type CodeChart, searchable } from './codeChart.ts';
import { type ColourTable, makeColourTable } from './colourTable.ts';
import { posteriorReader } from './posterior.ts';

/** Reads pixels of one photo: the record of a pixel's colour, in the table of its activity class (and angle). */
export interface PixelReader {
  /** Looks pixel (x, y) up; `records` then holds its modes from the offset returned (see `ColourTable`). */
  readonly lookUp: (x: number, y: number) => number;
  records: Float32Array;
  /** Thickness at the last pixel for thickness in its record: 1 where all are seen at one angle. */
  scale: number;
  /** Share that a second record has in the last pixel's reading; 0 for none. */
  share: number;
  /** Looks the last pixel up at the second angle; `besideRecords` and `besideScale` then belong to it. */
  readonly lookUpBeside: () => number;
  besideRecords: Float32Array;
  besideScale: number;
  /** Distinct colours met so far, all classes and angles. */
  readonly colours: () => number;
}

/** Colours that a table has room for at first: those of a whole photo, or of the strip at one angle. */
const ROOM = 1 << 16;
const STRIP_ROOM = 1 << 12;
/** A second angle with less say than this is not asked: a share of a difference of a nanometre or two. */
const LEAST_SHARE = 0.02;

/**
 * Makes a reader for a photo seen at one angle.
 * @param activity of the photo, judged once by `activityMap`
 * @param charts one chart for each activity class, calmest first
 */
export function makePixelReader(
  pixels: Omit<PhotoPixels, 'encoding'>,
  activity: ActivityMap,
  charts: readonly CodeChart[],
): PixelReader {
  const { codes, channels, width } = pixels;
  const { levels, shift } = levelsOf(pixels);
  const tables: ColourTable[] = charts.map((chart) =>
    makeColourTable(levels, posteriorReader(searchable(chart)), ROOM),
  );
  const reader: PixelReader = {
    records: new Float32Array(0),
    scale: 1,
    share: 0,
    besideRecords: new Float32Array(0),
    besideScale: 1,
    lookUp: (x, y) => {
      const at = (y * width + x) * channels;
      const block = ((y / BLOCK_SIDE) | 0) * activity.columns + ((x / BLOCK_SIDE) | 0);
      const table = tables[activity.classOf[block]!]!;
      const offset = table.lookUp(codes[at]! >> shift, codes[at + 1]! >> shift, codes[at + 2]! >> shift);
      reader.records = table.records();
      return offset;
    },
    lookUpBeside: () => 0,
    colours: () => tables.reduce((sum, table) => sum + table.colours(), 0),
  };
  return reader;
}

/**
 * Makes a reader for a photo whose pixels look at different angles: each is read at the nearest chart and, for its share,
 * at the one on the other side, so that readings show no seam where the nearest changes.
 * @param cosineAt cosine of the incidence at pixels of this very array
 */
export function makeAngleReader(
  pixels: Omit<PhotoPixels, 'encoding'>,
  activity: ActivityMap,
  angles: AngleCharts,
  cosineAt: CosineAt,
): PixelReader {
  const { codes, channels, width } = pixels;
  const { levels, shift } = levelsOf(pixels);
  const cursor = angleCursor(angles, cosineAt);
  const classes = angles.charts[0]!.length;
  const tables: (ColourTable | undefined)[] = new Array(angles.charts.length * classes).fill(undefined);
  const tableOf = (angle: number, activityClass: number): ColourTable => {
    const place = angle * classes + activityClass;
    const known = tables[place];
    if (known) return known;
    const chart = angles.charts[angle]![activityClass]!;
    const made = makeColourTable(levels, posteriorReader(searchable(chart)), STRIP_ROOM);
    tables[place] = made;
    return made;
  };
  let at = 0;
  let activityClass = 0;
  const reader: PixelReader = {
    records: new Float32Array(0),
    scale: 1,
    share: 0,
    besideRecords: new Float32Array(0),
    besideScale: 1,
    lookUp: (x, y) => {
      cursor.moveTo(x, y);
      at = (y * width + x) * channels;
      activityClass = activity.classOf[((y / BLOCK_SIDE) | 0) * activity.columns + ((x / BLOCK_SIDE) | 0)]!;
      const table = tableOf(cursor.near, activityClass);
      const offset = table.lookUp(codes[at]! >> shift, codes[at + 1]! >> shift, codes[at + 2]! >> shift);
      reader.records = table.records();
      reader.scale = cursor.scale;
      reader.share = cursor.share > LEAST_SHARE ? cursor.share : 0;
      return offset;
    },
    lookUpBeside: () => {
      const table = tableOf(cursor.beside, activityClass);
      const offset = table.lookUp(codes[at]! >> shift, codes[at + 1]! >> shift, codes[at + 2]! >> shift);
      reader.besideRecords = table.records();
      reader.besideScale = cursor.scaleBeside;
      return offset;
    },
    colours: () => tables.reduce((sum, table) => sum + (table?.colours() ?? 0), 0),
  };
  return reader;
}

function levelsOf({ maxCode }: Pick<PhotoPixels, 'maxCode'>): { levels: number; shift: number } {
  return maxCode === 255 ? { levels: 256, shift: 0 } : { levels: 1024, shift: 6 };
}
