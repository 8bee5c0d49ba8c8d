/**
 * Makes the two demo photos that the app offers, their set-ups, and their true thickness for the tests:
 * `npx tsx src/cli/makeDemoPhotos.ts`. Takes about a minute. The places, the camera and the moment are invented.
 */
import { mkdirSync, writeFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { encode } from 'fast-png';
import sharp, { type Exif } from 'sharp';
import { demoHarbour, demoSoapFilm } from '../scene/demoScenes.ts';
import { thinOutTruth } from '../scene/truthPicture.ts';
import type { Scene } from '../scene/types.ts';

const PHOTOS = fileURLToPath(new URL('../../public/demo/', import.meta.url));
const TRUTH = fileURLToPath(new URL('../../tests/scene/data/', import.meta.url));

/** Fields that both photos share. IFD2 is the EXIF block, IFD3 the GPS block, as libvips numbers them. */
function exifOf(own: {
  readonly description: string;
  readonly takenAt: string;
  readonly exposure: string;
  readonly iso: string;
  readonly latitude: string;
  readonly longitude: string;
  readonly directionDeg: number;
}): Exif {
  return {
    IFD0: {
      Make: 'Invented',
      Model: 'Rendered phone',
      Software: 'tintfathom forward model',
      ImageDescription: own.description,
      Orientation: '1',
    },
    IFD2: {
      DateTimeOriginal: own.takenAt,
      OffsetTimeOriginal: '-01:00',
      ExposureTime: own.exposure,
      FNumber: '18/10',
      ISOSpeedRatings: own.iso,
      FocalLength: '54/10',
      FocalLengthIn35mmFilm: '26',
      WhiteBalance: '0',
      ColorSpace: '1',
    },
    IFD3: {
      GPSVersionID: '2 3 0 0',
      GPSLatitudeRef: 'N',
      GPSLatitude: own.latitude,
      GPSLongitudeRef: 'W',
      GPSLongitude: own.longitude,
      GPSMapDatum: 'WGS-84',
      GPSImgDirectionRef: 'T',
      GPSImgDirection: `${Math.round(own.directionDeg * 10)}/10`,
    },
  };
}

async function write(scene: Scene, exif: Exif): Promise<void> {
  const { width, height, name } = scene;
  await sharp(scene.codes, { raw: { width, height, channels: 3 } })
    .jpeg({ quality: 90, chromaSubsampling: '4:2:0' })
    .withExif(exif)
    .toFile(`${PHOTOS}${name}.jpg`);
  writeFileSync(`${PHOTOS}${name}.setup.json`, `${JSON.stringify(scene.setup, null, 2)}\n`);
  const truth = thinOutTruth(scene, 8);
  const png = encode({ ...truth, channels: 1, depth: 16 });
  writeFileSync(`${TRUTH}${name}-truth.png`, png);
  console.log(`${name}: ${width} x ${height}, truth ${truth.width} x ${truth.height}, ${png.length} bytes`);
}

mkdirSync(PHOTOS, { recursive: true });
mkdirSync(TRUTH, { recursive: true });
// A place in the open Atlantic where there is no land, so that nobody's harbour is meant.
await write(
  demoHarbour(),
  exifOf({
    description: 'A rendered, invented harbour with a sheen of diesel oil; no real place',
    takenAt: '2025:05:14 10:32:07',
    exposure: '1/125',
    iso: '80',
    latitude: '47/1 15/1 36/10',
    longitude: '21/1 24/1 108/10',
    directionDeg: 214.5,
  }),
);
await write(
  demoSoapFilm(),
  exifOf({
    description: 'A rendered soap film in a wire frame; no real bench',
    takenAt: '2025:05:15 16:05:41',
    exposure: '1/60',
    iso: '200',
    latitude: '47/1 15/1 36/10',
    longitude: '21/1 24/1 108/10',
    directionDeg: 35,
  }),
);
