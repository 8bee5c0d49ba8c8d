/**
 * Our ZIP read by others: Python's zipfile, Info-ZIP's unzip, and coreutils' sha256sum over the checksums inside; our
 * ground map without a position by GDAL. ZIP: PKWARE APPNOTE; SHA-256: FIPS 180-4, whose example "abc" is checked too.
 */
import { afterAll, beforeAll, expect, test } from 'vitest';
import { readArchive, writeArchive } from '../../src/record/archive.ts';
import { withoutPosition } from '../../src/record/redact.ts';
import { quayObservation, sampleFiles, nodeSha256 as sha256 } from '../record/sample.ts';
import { scratch, tool } from '../record/tools.ts';

const files = scratch();
afterAll(files.remove);
let zip = '';

beforeAll(async () => {
  const pieces = await writeArchive(
    { observation: quayObservation(), files: sampleFiles() },
    { sha256, exports: new Map([['results – Größe.csv', 'a_m\r\n1\r\n']]) },
  );
  zip = files.write('observation.zip', Buffer.concat(pieces));
});

const python = (code: string, ...args: string[]) => tool('python3', ['-c', code, ...args]);

test('the hash is that of FIPS 180-4, appendix B.1', async () => {
  expect(await sha256(new TextEncoder().encode('abc'))).toBe(
    'ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad',
  );
});

test('unzip finds no error', () => {
  expect(tool('unzip', ['-t', zip])).toMatch(/No errors detected/);
});

test('Python reads every file, its name and its time', () => {
  const said = JSON.parse(
    python(
      `import zipfile, json, sys, hashlib
z = zipfile.ZipFile(sys.argv[1])
print(json.dumps({"bad": z.testzip(), "times": sorted({i.date_time for i in z.infolist()}),
  "sums": {i.filename: hashlib.sha256(z.read(i)).hexdigest() for i in z.infolist()}}))`,
      zip,
    ),
  );
  expect(said.bad).toBeNull();
  // The ZIP's clock has steps of two seconds.
  expect(said.times).toEqual([[2025, 5, 14, 11, 45, 30]]);
  for (const { path, sha256: recorded } of quayObservation().files) expect(said.sums[path]).toBe(recorded);
  expect(said.sums).toHaveProperty(['exports/results – Größe.csv']);
});

test('sha256sum -c approves every file that was unpacked', () => {
  const folder = files.path('unpacked');
  python('import zipfile, sys; zipfile.ZipFile(sys.argv[1]).extractall(sys.argv[2])', zip, folder);
  const said = tool('bash', ['-c', 'cd "$1" && sha256sum -c SHA256SUMS.txt', 'bash', folder]);
  expect(said.match(/: OK$/gm)).toHaveLength(1 + sampleFiles().size + 1);
});

test('what Python packs anew comes back as well', async () => {
  const again = files.path('again.zip');
  python(
    `import zipfile, sys
a = zipfile.ZipFile(sys.argv[1]); b = zipfile.ZipFile(sys.argv[2], "w", zipfile.ZIP_DEFLATED)
for i in reversed(a.infolist()): b.writestr(i.filename, a.read(i))
b.close()`,
    zip,
    again,
  );
  const back = await readArchive(files.read('again.zip'), sha256);
  expect(back.observation).toEqual(quayObservation());
});

test('without its position the ground map is only an engineering grid to GDAL, of the same size', async () => {
  const before = { observation: quayObservation(), files: sampleFiles() };
  const after = await withoutPosition(before, { keepOriginal: false, sha256 });
  const about = (name: string, bytes: Uint8Array) =>
    JSON.parse(tool('gdalinfo', ['-json', files.write(name, bytes)]));
  const placed = about('placed.tif', before.files.get('results/thickness_geo.tif')!);
  const local = about('local.tif', after.files.get('results/thickness_geo.tif')!);
  expect(placed.wgs84Extent.coordinates[0][0][1]).toBeCloseTo(47.251, 2);
  expect(local.wgs84Extent).toBeUndefined();
  expect(local.coordinateSystem.wkt).toMatch(/^ENGCRS/);
  expect(local.geoTransform).toEqual(placed.geoTransform);
});
