/** The store in a real browser: IndexedDB, quotas and Web Crypto are its own. */
import { afterAll, afterEach, beforeAll, expect, test } from 'vitest';
import type { Observation } from '../../src/record/observation.ts';
import { writeObservation } from '../../src/record/readObservation.ts';
import { isFound } from '../../src/record/searchText.ts';
import { openServedPage, type ServedPage } from '../browser/servedPage.ts';
import { nodeSha256, notebookObservation, quayObservation, sampleFiles } from './sample.ts';
import type { Crossing } from './storeInPage.ts';

let served: ServedPage;
beforeAll(async () => {
  served = await openServedPage({
    module: '/tests/record/storeInPage.ts',
    ready: 'recordTests',
    packages: ['idb', 'valibot', 'fflate'],
  });
}, 60_000);
afterAll(() => served?.close());
afterEach(() => served.page.evaluate(() => recordTests.deleteAll()));

const quay = (): Crossing => ({
  observation: quayObservation(),
  files: [...sampleFiles()].map(([path, bytes]) => [path, [...bytes]]),
});
const notebook = (changes: Partial<Observation> = {}): Crossing => ({
  observation: { ...notebookObservation(), ...changes },
  files: [],
});
const save = (content: Crossing) => served.page.evaluate((c) => recordTests.save(c), content);
const titles = async (query?: string) =>
  (await served.page.evaluate((q) => recordTests.list(q), query)).map(
    (e) => e.observation?.title ?? e.problem,
  );
const QUAY_ID = quayObservation().id;
const startAfresh = () =>
  served.page.evaluate(
    () =>
      new Promise<void>((resolve, reject) => {
        recordTests.close();
        const gone = indexedDB.deleteDatabase('records-under-test');
        gone.onsuccess = () => resolve();
        gone.onerror = () => reject(gone.error);
      }),
  );

test('the browser’s hash is Node’s', async () => {
  const bytes = [...sampleFiles().values()][0]!;
  expect(await served.page.evaluate((b) => recordTests.sha256(b), [...bytes])).toBe(await nodeSha256(bytes));
});

test('what is saved comes back byte for byte, also after a reload', async () => {
  await save(quay());
  await served.page.reload();
  await served.page.waitForFunction(() => 'recordTests' in globalThis);
  const back = await served.page.evaluate((id) => recordTests.open(id), QUAY_ID);
  expect(writeObservation(back.observation)).toBe(writeObservation(quayObservation()));
  expect(back.files).toEqual(quay().files);
});

test('saving again replaces, and the list has the last changed first', async () => {
  await save(quay());
  await save(notebook({ changedUtc: '2025-06-01T00:00:00Z' }));
  await save({ ...quay(), observation: { ...quayObservation(), title: 'Renamed' } });
  expect(await titles()).toEqual(['Slick off the point', 'Renamed']);
});

test('words find observations by title, place, film, date and remark, whatever their case and accents', async () => {
  await save({ ...quay(), observation: { ...quayObservation(), title: 'Löschwasser am Kai' } });
  await save(notebook());
  expect(await titles('losch KAI')).toEqual(['Löschwasser am Kai']);
  expect(await titles('diesel 14 may')).toEqual(['Löschwasser am Kai']);
  expect(await titles('wildlife')).toEqual(['Löschwasser am Kai']);
  expect(await titles('point')).toEqual(['Slick off the point']);
  expect(await titles('kai point')).toEqual([]);
  expect(await titles('  ')).toHaveLength(2);
});

test('a copy shares the files and can be changed on its own', async () => {
  await save(quay());
  const before = await served.page.evaluate(() => recordTests.fileHashes());
  const id = await served.page.evaluate((of) => recordTests.duplicate(of), QUAY_ID);
  expect(id).not.toBe(QUAY_ID);
  expect(await served.page.evaluate(() => recordTests.fileHashes())).toEqual(before);
  const copy = await served.page.evaluate((of) => recordTests.open(of), id);
  expect(copy.observation.title).toBe('Sheen at the inner quay, "north" end (copy)');
  expect(copy.files).toEqual(quay().files);
  await served.page.evaluate((of) => recordTests.remove(of), QUAY_ID);
  await served.page.evaluate(() => recordTests.deleteForGood());
  expect((await served.page.evaluate((of) => recordTests.open(of), id)).files).toEqual(quay().files);
});

test('removed is off the list and can be undone; for good frees its files', async () => {
  await save(quay());
  await served.page.evaluate((id) => recordTests.remove(id), QUAY_ID);
  expect(await titles()).toEqual([]);
  await expect(served.page.evaluate((id) => recordTests.open(id), QUAY_ID)).rejects.toThrow(
    'no longer on this device',
  );
  await served.page.evaluate((id) => recordTests.undoRemove(id), QUAY_ID);
  expect(await titles()).toHaveLength(1);
  expect((await served.page.evaluate((id) => recordTests.open(id), QUAY_ID)).files).toEqual(quay().files);
  await served.page.evaluate((id) => recordTests.remove(id), QUAY_ID);
  await served.page.evaluate(() => recordTests.deleteForGood());
  expect(await served.page.evaluate(() => recordTests.fileHashes())).toEqual([]);
  await served.page.evaluate((id) => recordTests.undoRemove(id), QUAY_ID);
  expect(await titles()).toEqual([]);
});

test('what was removed over an hour ago is gone when the store opens again, what was removed just now is not', async () => {
  const hours = 3_600_000;
  for (const [id, at] of [
    ['old', Date.now() - 2 * hours],
    ['new', Date.now() - 0.5 * hours],
  ] as const) {
    await served.page.evaluate(([key, o, when]) => recordTests.plant(key, o, when), [
      id,
      { ...notebookObservation(), id },
      at,
    ] as const);
  }
  await served.page.evaluate(() => recordTests.close());
  for (const id of ['old', 'new']) await served.page.evaluate((key) => recordTests.undoRemove(key), id);
  expect((await served.page.evaluate(() => recordTests.list())).map(({ id }) => id)).toEqual(['new']);
});

test('delete all leaves nothing', async () => {
  await save(quay());
  await save(notebook());
  await served.page.evaluate(() => recordTests.deleteAll());
  expect(await titles()).toEqual([]);
  expect(await served.page.evaluate(() => recordTests.fileHashes())).toEqual([]);
});

test('an observation without one of its files is not saved', async () => {
  const content = quay();
  await expect(save({ ...content, files: content.files.slice(1) })).rejects.toThrow('missing or incomplete');
  expect(await titles()).toEqual([]);
});

test('one that a newer version made stays, says so, and does not hide the others', async () => {
  await save(notebook());
  const newer = { ...quayObservation(), schemaVersion: 99 };
  await served.page.evaluate(([id, o]) => recordTests.plant(id, o), [newer.id, newer] as const);
  const list = await titles();
  expect(list).toHaveLength(2);
  expect(list).toContain('Slick off the point');
  expect(list.join()).toContain('update the app');
});

test('another page that upgrades the database is not held up', async () => {
  await save(notebook());
  const names = await Promise.race([
    served.page.evaluate(() => recordTests.upgradeElsewhere(7)),
    new Promise<string>((resolve) => setTimeout(() => resolve('held up'), 10_000)),
  ]);
  expect(names).toEqual(['files', 'more', 'observations']);
  // An old page cannot open the newer database, and must say so rather than hang.
  await expect(served.page.evaluate(() => recordTests.list())).rejects.toThrow(
    'written by a newer Tintfathom',
  );
  await startAfresh();
});

test('a later version lifts the database step by step and keeps what is in it', async () => {
  await save(quay());
  const hashes = await served.page.evaluate(() => recordTests.fileHashes());
  expect(await served.page.evaluate(() => recordTests.upgradeByStep())).toEqual({
    version: 2,
    indexes: ['deletedAt'],
    ids: [QUAY_ID],
    files: hashes,
  });
  await startAfresh();
});

test('a full device is a sentence, and loses nothing that was saved before', async () => {
  // Of its own, for Chromium remembers for a while how much room there was.
  const context = await served.browser.newContext();
  const page = await context.newPage();
  const session = await context.newCDPSession(page);
  await page.goto(`${served.origin}/blank`);
  await page.waitForFunction(() => 'recordTests' in globalThis);
  await session.send('Storage.overrideQuotaForOrigin', { origin: served.origin, quotaSize: 24 << 20 });
  await page.evaluate((content) => recordTests.save(content), quay());
  await expect(page.evaluate((o) => recordTests.saveLarge(o, 40), notebookObservation())).rejects.toThrow(
    'There is no room left on this device: export observations as ZIP',
  );
  const list = await page.evaluate(() => recordTests.list());
  expect(list.map(({ id }) => id)).toEqual([QUAY_ID]);
  expect((await page.evaluate((id) => recordTests.open(id), QUAY_ID)).files).toEqual(quay().files);
  await context.close();
});

test('from 80 % on there is a warning', async () => {
  // Chromium states ten gigabytes above what is used, whatever the device has: the estimate is put in its mouth.
  const warningAt = (usage: number) =>
    served.page.evaluate(async (used) => {
      const estimate = navigator.storage.estimate;
      navigator.storage.estimate = async () => ({ usage: used, quota: 1000 });
      const { warning } = await recordTests.storage();
      navigator.storage.estimate = estimate;
      return warning;
    }, usage);
  expect(await warningAt(799)).toBeNull();
  expect(await warningAt(800)).toBe(
    'The room for observations is 80 % full: export the older ones as ZIP and delete them here.',
  );
  const state = await served.page.evaluate(() => recordTests.storage());
  expect(state.quotaBytes).toBeGreaterThan(1e6);
  expect(state.warning).toBeNull();
});

test('the search is over words, not letters in a row', () => {
  expect(isFound(quayObservation(), 'quay sheen')).toBe(true);
  expect(isFound(quayObservation(), 'quaysheen')).toBe(false);
});
