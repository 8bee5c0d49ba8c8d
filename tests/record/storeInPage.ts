/** Runs in the test page: calls the store and hands back what can cross to Node. */
import { openDB } from 'idb';
import type { ArchiveContent } from '../../src/record/archive.ts';
import { openDatabase, UPGRADES } from '../../src/record/database.browser.ts';
import type { Observation } from '../../src/record/observation.ts';
import { webSha256 } from '../../src/record/sha256.browser.ts';
import { openStore, type RecordStore } from '../../src/record/store.browser.ts';

export interface Crossing {
  readonly observation: Observation;
  readonly files: readonly (readonly [string, readonly number[]])[];
}

const inward = ({ observation, files }: Crossing): ArchiveContent => ({
  observation,
  files: new Map(files.map(([path, bytes]) => [path, Uint8Array.from(bytes)])),
});
const outward = ({ observation, files }: ArchiveContent): Crossing => ({
  observation,
  files: [...files].map(([path, bytes]) => [path, [...bytes]]),
});

const NAME = 'records-under-test';
let store: RecordStore | null = null;
const theStore = async () => {
  store ??= await openStore(NAME);
  return store;
};

const storeTests = {
  sha256: (bytes: readonly number[]) => webSha256(Uint8Array.from(bytes)),
  save: async (content: Crossing) => (await theStore()).save(inward(content)),
  /** Saves an observation with one file of that many random bytes, which nothing can pack. */
  saveLarge: async (observation: Observation, megabytes: number) => {
    const bytes = new Uint8Array(megabytes << 20);
    for (let i = 0; i < bytes.length; i += 65536) crypto.getRandomValues(bytes.subarray(i, i + 65536));
    const path = 'results/profile.csv';
    const file = {
      path,
      role: 'profile',
      mediaType: 'text/csv',
      byteLength: bytes.length,
      sha256: await webSha256(bytes),
    } as const;
    await (await theStore()).save({
      observation: { ...observation, files: [file] },
      files: new Map([[path, bytes]]),
    });
  },
  list: async (query?: string) => (await theStore()).list(query),
  open: async (id: string) => outward(await (await theStore()).open(id)),
  duplicate: async (id: string) => (await theStore()).duplicate(id),
  remove: async (id: string) => (await theStore()).remove(id),
  undoRemove: async (id: string) => (await theStore()).undoRemove(id),
  deleteForGood: async () => (await theStore()).deleteForGood(),
  deleteAll: async () => (await theStore()).deleteAll(),
  storage: async () => (await theStore()).storage(),
  /** Files in the database, by hash. */
  fileHashes: async () => {
    const database = await openDB(NAME);
    const keys = (await database.getAllKeys('files')) as string[];
    database.close();
    return keys;
  },
  /** Puts a record in as it is, past all checks, as an older or newer version would have left it. */
  plant: async (id: string, observation: unknown, deletedAt: number | null = null) => {
    await theStore();
    const database = await openDB(NAME);
    await database.put('observations', { id, observation, fileHashes: [], deletedAt });
    database.close();
  },
  close: () => {
    store?.close();
    store = null;
  },
  /** Lifts the database by a step more than there are, as the next version would. */
  upgradeByStep: async () => {
    store?.close();
    store = null;
    const database = await openDatabase(NAME, () => {}, [
      ...UPGRADES,
      (_database, transaction) => {
        transaction.objectStore('observations').createIndex('deletedAt' as never, 'deletedAt');
      },
    ]);
    const transaction = database.transaction('observations');
    const answer = {
      version: database.version,
      indexes: [...transaction.store.indexNames],
      ids: await transaction.store.getAllKeys(),
      files: await database.getAllKeys('files'),
    };
    database.close();
    return answer;
  },
  /** Another page wants a newer database: it must not wait for this one. */
  upgradeElsewhere: async (version: number) => {
    const database = await openDB(NAME, version, { upgrade: (db) => void db.createObjectStore('more') });
    const names = [...database.objectStoreNames];
    database.close();
    return names;
  },
};

declare global {
  var recordTests: typeof storeTests;
}
globalThis.recordTests = storeTests;
