/** Our reading of EXIF against exiftool's, on files that exiftool wrote. */
import { afterAll, expect, test } from 'vitest';
import { decodePhotoFile } from '../../src/cli/decodePhoto.ts';
import { encode, exiftoolSays, type Kind, scratch, slopes, writeTagged } from '../photo/madePhotos.ts';

const files = scratch();
afterAll(files.remove);

const TAGS = [
  '-Orientation#=1',
  '-Make=Invented Optics',
  '-Model=Field Two',
  '-DateTimeOriginal=2024:03:09 07:08:09',
  '-OffsetTimeOriginal=-03:30',
  '-SubSecTimeOriginal=250',
  '-GPSLatitude=53.123456',
  '-GPSLatitudeRef=S',
  '-GPSLongitude=8.507',
  '-GPSLongitudeRef=W',
  '-GPSHPositioningError=4.5',
  '-GPSAltitude=12.5',
  '-GPSAltitudeRef#=1',
  '-GPSImgDirection=123.4',
  '-GPSImgDirectionRef=M',
  '-CameraElevationAngle=-12.5',
  '-FocalLength=4.25',
  '-FocalLengthIn35mmFormat=26',
  '-ExposureTime=1/125',
  '-FNumber=1.8',
  '-ISO=320',
  '-WhiteBalance#=1',
];

test.each(['jpeg', 'png', 'webp', 'avif'] as Kind[])('%s: every field as exiftool reads it', async (kind) => {
  const path = writeTagged(files.path(`all.${kind}`), await encode(slopes(), kind), TAGS);
  const says = exiftoolSays(path);
  const { metadata } = await decodePhotoFile(path);
  expect(metadata.cameraMake).toBe(says.Make);
  expect(metadata.cameraModel).toBe(says.Model);
  // exiftool: "2024:03:09 07:08:09.250-03:30".
  expect(metadata.takenAt).toBe(
    String(says.SubSecDateTimeOriginal).replace(/^(\d+):(\d+):(\d+) /, '$1-$2-$3T'),
  );
  expect(metadata.takenAtHasOffset).toBe(true);
  expect(metadata.position?.latitudeDeg).toBeCloseTo(Number(says.GPSLatitude), 9);
  expect(metadata.position?.longitudeDeg).toBeCloseTo(Number(says.GPSLongitude), 9);
  expect(metadata.position?.errorM).toBe(says.GPSHPositioningError);
  expect(metadata.altitudeM).toBe(says.GPSAltitude);
  expect(metadata.altitudeM).toBe(-12.5);
  expect(metadata.headingDeg).toBe(says.GPSImgDirection);
  expect(metadata.headingReference).toBe({ M: 'magnetic', T: 'true' }[String(says.GPSImgDirectionRef)]);
  expect(metadata.elevationDeg).toBe(says.CameraElevationAngle);
  expect(metadata.focalLengthMm).toBe(says.FocalLength);
  expect(metadata.focalLength35mm).toBe(says.FocalLengthIn35mmFormat);
  expect(metadata.exposureTimeS).toBe(says.ExposureTime);
  expect(metadata.fNumber).toBe(says.FNumber);
  expect(metadata.iso).toBe(says.ISO);
  expect(metadata.whiteBalance).toBe(['auto', 'manual'][Number(says.WhiteBalance)]);
  expect(metadata.mimeType).toBe(says.MIMEType);
  expect([metadata.originalWidth, metadata.originalHeight]).toEqual([says.ImageWidth, says.ImageHeight]);
  expect(metadata.byteLength).toBe(parseInt(String(says.FileSize), 10));
});

test('a photo without EXIF says nothing of time and place', async () => {
  const path = writeTagged(files.path('bare.jpeg'), await encode(slopes(), 'jpeg'), []);
  const { metadata, notices } = await decodePhotoFile(path);
  expect(metadata.takenAt).toBeUndefined();
  expect(metadata.position).toBeUndefined();
  expect(metadata.takenAtHasOffset).toBe(false);
  expect(metadata.profileName).toBe('none, taken as sRGB');
  expect(notices).toEqual([]);
});
