import { strFromU8, unzipSync, zipSync } from 'fflate';
import { describe, expect, test } from 'vitest';
import { type ArchiveContent, readArchive, writeArchive } from '../../src/record/archive.ts';
import { RecordError, writeObservation } from '../../src/record/readObservation.ts';
import {
  notebookObservation,
  originalBytes,
  quayObservation,
  sampleFiles,
  nodeSha256 as sha256,
} from './sample.ts';

const content = (): ArchiveContent => ({ observation: quayObservation(), files: sampleFiles() });
const zipOf = async (from: ArchiveContent, options = {}) =>
  new Uint8Array(Buffer.concat(await writeArchive(from, { sha256, ...options })));

test('the observation and every file come back byte for byte', async () => {
  const { observation, files } = content();
  const back = await readArchive(await zipOf({ observation, files }), sha256);
  expect(writeObservation(back.observation)).toBe(writeObservation(observation));
  expect([...back.files.keys()]).toEqual([...files.keys()]);
  for (const [path, bytes] of files) expect(Buffer.compare(back.files.get(path)!, bytes)).toBe(0);
  expect(back.files.get('original/Quay 1 "north".jpg')).toEqual(originalBytes);
});

test('an observation without files is an archive too', async () => {
  const observation = notebookObservation();
  const back = await readArchive(await zipOf({ observation, files: new Map() }), sha256);
  expect(back).toEqual({ observation, files: new Map() });
});

test('exported, imported and exported again: the same ZIP', async () => {
  const first = await zipOf(content());
  const second = await zipOf(await readArchive(first, sha256));
  expect(Buffer.compare(first, second)).toBe(0);
});

test('exports lie beside the record, are in the checksums, and do not come back as files', async () => {
  const zip = await zipOf(content(), { exports: new Map([['results.csv', 'a_m,b\r\n']]) });
  const inside = unzipSync(zip);
  expect(strFromU8(inside['exports/results.csv']!)).toBe('a_m,b\r\n');
  expect(strFromU8(inside['SHA256SUMS.txt']!)).toContain('  exports/results.csv\n');
  expect((await readArchive(zip, sha256)).files.has('exports/results.csv')).toBe(false);
});

test('large files are packed in pieces with pauses between', async () => {
  const bytes = Uint8Array.from({ length: 5_000_001 }, (_, i) => (i * 2654435761) >>> 24);
  const path = 'results/profile.csv';
  const observation = {
    ...notebookObservation(),
    files: [
      { path, role: 'profile', mediaType: 'text/csv', byteLength: bytes.length, sha256: await sha256(bytes) },
    ],
  } as const;
  let pauses = 0;
  const pause = async () => {
    pauses++;
  };
  const zip = await zipOf({ observation, files: new Map([[path, bytes]]) }, { pause });
  expect(pauses).toBe(2);
  expect(Buffer.compare((await readArchive(zip, sha256)).files.get(path)!, bytes)).toBe(0);
});

test('a file that is missing or changed cannot be exported as the recorded one', async () => {
  const { observation, files } = content();
  const without = new Map(files);
  without.delete('results/order.tif');
  await expect(writeArchive({ observation, files: without }, { sha256 })).rejects.toThrow(
    '"results/order.tif"',
  );
  const other = new Map(files).set('results/order.tif', Uint8Array.of(1, 2));
  await expect(writeArchive({ observation, files: other }, { sha256 })).rejects.toThrow(
    'no longer what was recorded',
  );
});

describe('what is no whole archive says so', () => {
  test('another file', async () => {
    for (const bytes of [new Uint8Array(), originalBytes, new TextEncoder().encode('hello'.repeat(50))]) {
      await expect(readArchive(bytes, sha256)).rejects.toThrow('choose a ZIP that Tintfathom exported');
    }
  });

  test('another ZIP', async () => {
    const zip = zipSync({ 'a.txt': new Uint8Array(5) });
    await expect(readArchive(zip, sha256)).rejects.toThrow('There is no observation in this file');
  });

  test('a ZIP cut short', async () => {
    const zip = await zipOf(content());
    await expect(readArchive(zip.subarray(0, zip.length - 100), sha256)).rejects.toThrow('copy it again');
    await expect(readArchive(zip.subarray(0, 500), sha256)).rejects.toThrow('copy it again');
  });

  test('a photo that was edited inside the ZIP', async () => {
    const inside = unzipSync(await zipOf(content()));
    const path = 'original/Quay 1 "north".jpg';
    inside[path]![100]! ^= 1;
    await expect(readArchive(zipSync(inside), sha256)).rejects.toThrow(
      `"${path}" in this ZIP does not match its SHA-256`,
    );
    inside[path] = new Uint8Array(3);
    await expect(readArchive(zipSync(inside), sha256)).rejects.toThrow(
      'is missing in this ZIP or was changed',
    );
  });

  test('an observation that was edited inside the ZIP', async () => {
    const inside = unzipSync(await zipOf(content()));
    const text = strFromU8(inside['observation.json']!).replace('"windMS": 3', '"windMS": 4');
    inside['observation.json'] = new TextEncoder().encode(text);
    await expect(readArchive(zipSync(inside), sha256)).rejects.toThrow(
      '"observation.json" in this ZIP does not match',
    );
  });

  test('any damaged byte: the same content, or a RecordError', async () => {
    const zip = await zipOf(content());
    const whole = writeObservation(quayObservation());
    let refused = 0;
    for (let i = 0; i < zip.length; i += 37) {
      const bad = zip.slice();
      bad[i]! ^= 0xff;
      try {
        const back = await readArchive(bad, sha256);
        expect(writeObservation(back.observation)).toBe(whole);
        for (const [path, bytes] of sampleFiles())
          expect(Buffer.compare(back.files.get(path)!, bytes)).toBe(0);
      } catch (error) {
        expect(error).toBeInstanceOf(RecordError);
        refused++;
      }
    }
    expect(refused).toBeGreaterThan(100);
  });
});
