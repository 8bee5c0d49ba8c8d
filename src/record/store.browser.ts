/** The observations kept on this device. Nothing leaves it. */
import type { ArchiveContent } from './archive.ts';
import { openDatabase, type RecordDatabase } from './database.browser.ts';
import { notKnown } from './notKnown.ts';
import type { Observation } from './observation.ts';
import { RecordError, readObservation, writeObservation } from './readObservation.ts';
import { isFound } from './searchText.ts';
import { type StorageState, storageState } from './storage.browser.ts';

export type ObservationEntry =
  | { readonly id: string; readonly observation: Observation; readonly problem: null }
  /** One that this version cannot read: it stays, and the sentence says why. */
  | { readonly id: string; readonly observation: null; readonly problem: string };

export interface RecordStore {
  /** Keeps an observation and its files, in place of one of the same id. @throws RecordError */
  save(content: ArchiveContent): Promise<void>;
  /** Keeps an observation whose files are as they were: only its words change. @throws RecordError */
  revise(observation: Observation): Promise<void>;
  /** Bytes of one file by its SHA-256; null where they are not here. */
  file(sha256: string): Promise<Uint8Array | null>;
  /** Those whose words hold all of the query's, the last changed first; all without a query. */
  list(query?: string): Promise<ObservationEntry[]>;
  /** @throws RecordError where it is not there or cannot be read */
  open(id: string): Promise<ArchiveContent>;
  /** A copy under a new id, to be changed on its own. @returns its id */
  duplicate(id: string): Promise<string>;
  /** Takes it off the list. It can be undone for an hour, and until `deleteForGood`. */
  remove(id: string): Promise<void>;
  undoRemove(id: string): Promise<void>;
  /** Frees the room of removed observations (all, or those removed before a time) and of files that none needs. */
  deleteForGood(removedBeforeMs?: number): Promise<void>;
  /** Everything, at once, for good. */
  deleteAll(): Promise<void>;
  storage(): Promise<StorageState>;
  close(): void;
}

/** How long a removed observation can come back after the app was closed. */
const UNDO_MS = 3_600_000;

const FULL =
  'There is no room left on this device: export observations as ZIP, delete them here, and save again. What was saved before is still there.';

const NEWER =
  'The observations on this device were written by a newer Tintfathom: close its other windows and load the app again.';
const CLOSED =
  'This browser keeps no observations here (a private window does so): export each as ZIP before you leave.';

/** Opens the store, and clears away what was removed more than an hour ago. @throws RecordError where it cannot be opened */
export async function openStore(name = 'tintfathom-records'): Promise<RecordStore> {
  let opened: Promise<RecordDatabase> | null = null;
  /** Another page may have closed it for an upgrade. */
  const database = async () => {
    opened ??= openDatabase(name, () => {
      opened = null;
    });
    try {
      return await opened;
    } catch (cause) {
      opened = null;
      const isNewer = cause instanceof DOMException && cause.name === 'VersionError';
      throw new RecordError(isNewer ? NEWER : CLOSED, { cause });
    }
  };
  const store: RecordStore = {
    save: async (content) => {
      await guarded(async () => save(await database(), content));
      // Only now is there something worth asking for: browsers weigh what a person has done. Workers cannot ask.
      const storage: StorageManager & { persist?: () => Promise<boolean> } = navigator.storage;
      await storage?.persist?.().catch(() => false);
    },
    revise: (observation) => guarded(async () => revise(await database(), observation)),
    file: async (sha256) => (await (await database()).get('files', sha256)) ?? null,
    list: async (query = '') => list(await database(), query),
    open: async (id) => open(await database(), id),
    duplicate: (id) => guarded(async () => duplicate(await database(), id)),
    remove: async (id) => mark(await database(), id, Date.now()),
    undoRemove: async (id) => mark(await database(), id, null),
    deleteForGood: async (before = Number.POSITIVE_INFINITY) => sweep(await database(), before),
    deleteAll: async () => {
      const transaction = (await database()).transaction(['observations', 'files'], 'readwrite');
      await Promise.all([
        transaction.objectStore('observations').clear(),
        transaction.objectStore('files').clear(),
        transaction.done,
      ]);
    },
    storage: storageState,
    close: () => {
      void opened?.then((db) => db.close());
      opened = null;
    },
  };
  await store.deleteForGood(Date.now() - UNDO_MS);
  return store;
}

/** Turns a full device into a sentence. */
async function guarded<T>(work: () => Promise<T>): Promise<T> {
  try {
    return await work();
  } catch (cause) {
    const isFull = cause instanceof DOMException && /Quota/.test(`${cause.name} ${cause.message}`);
    throw isFull ? new RecordError(FULL, { cause }) : cause;
  }
}

async function save(database: RecordDatabase, { observation, files }: ArchiveContent): Promise<void> {
  // Through text and back: what is kept is what an export holds, and numbers that are none are found now.
  const kept: unknown = JSON.parse(writeObservation(readObservation(observation)));
  for (const { path, byteLength } of observation.files) {
    if (files.get(path)?.length !== byteLength) {
      throw new RecordError(`"${path}" of this observation is missing or incomplete: it was not saved.`);
    }
  }
  const transaction = database.transaction(['observations', 'files'], 'readwrite');
  const { id } = observation;
  const fileHashes = observation.files.map(({ sha256 }) => sha256);
  const puts = [
    transaction.objectStore('observations').put({ id, observation: kept, fileHashes, deletedAt: null }),
    ...observation.files.map(({ path, sha256 }) =>
      transaction.objectStore('files').put(files.get(path)!, sha256),
    ),
    transaction.done,
  ];
  // The transaction tells why all failed, the single requests only that they did.
  await Promise.allSettled(puts);
  await transaction.done;
}

async function revise(database: RecordDatabase, observation: Observation): Promise<void> {
  const kept: unknown = JSON.parse(writeObservation(readObservation(observation)));
  const transaction = database.transaction('observations', 'readwrite');
  const stored = await transaction.store.get(observation.id);
  const hashes = observation.files.map(({ sha256 }) => sha256);
  if (stored?.deletedAt !== null || hashes.join() !== stored.fileHashes.join()) {
    await transaction.done;
    throw new RecordError('This observation is no longer on this device: import its ZIP.');
  }
  await transaction.store.put({ ...stored, observation: kept });
  await transaction.done;
}

async function list(database: RecordDatabase, query: string): Promise<ObservationEntry[]> {
  const stored = await database.getAll('observations');
  const entries = stored
    .filter(({ deletedAt }) => deletedAt === null)
    .map(({ id, observation }): ObservationEntry => {
      try {
        return { id, observation: readObservation(observation), problem: null };
      } catch (error) {
        return { id, observation: null, problem: error instanceof Error ? error.message : String(error) };
      }
    });
  const changed = (entry: ObservationEntry) => entry.observation?.changedUtc ?? '';
  return entries
    .filter(({ observation }) => (observation ? isFound(observation, query) : query.trim() === ''))
    .sort((a, b) => changed(b).localeCompare(changed(a)));
}

async function open(database: RecordDatabase, id: string): Promise<ArchiveContent> {
  const transaction = database.transaction(['observations', 'files']);
  const stored = await transaction.objectStore('observations').get(id);
  if (!stored || stored.deletedAt !== null) {
    throw new RecordError('This observation is no longer on this device: import its ZIP.');
  }
  const observation = readObservation(stored.observation);
  const files = new Map<string, Uint8Array>();
  for (const { path, sha256 } of observation.files) {
    const bytes = await transaction.objectStore('files').get(sha256);
    if (!bytes) throw new RecordError(`"${path}" of this observation is lost: import its ZIP again.`);
    files.set(path, bytes);
  }
  return { observation, files };
}

async function duplicate(database: RecordDatabase, id: string): Promise<string> {
  const stored = await database.get('observations', id);
  if (!stored || stored.deletedAt !== null) {
    throw new RecordError('This observation is no longer on this device: import its ZIP.');
  }
  const original = readObservation(stored.observation);
  const now = new Date().toISOString();
  const copy: Observation = {
    ...original,
    id: crypto.randomUUID(),
    title: `${original.title} (copy)`,
    createdUtc: now,
    changedUtc: now,
  };
  const observation: Observation = { ...copy, notKnown: notKnown(copy) };
  await database.put('observations', { ...stored, id: copy.id, observation });
  return copy.id;
}

async function mark(database: RecordDatabase, id: string, deletedAt: number | null): Promise<void> {
  const transaction = database.transaction('observations', 'readwrite');
  const stored = await transaction.store.get(id);
  if (stored) await transaction.store.put({ ...stored, deletedAt });
  await transaction.done;
}

async function sweep(database: RecordDatabase, removedBeforeMs: number): Promise<void> {
  const transaction = database.transaction(['observations', 'files'], 'readwrite');
  const observations = transaction.objectStore('observations');
  const files = transaction.objectStore('files');
  const needed = new Set<string>();
  for (const { id, deletedAt, fileHashes } of await observations.getAll()) {
    if (deletedAt !== null && deletedAt < removedBeforeMs) await observations.delete(id);
    else for (const hash of fileHashes) needed.add(hash);
  }
  for (const hash of await files.getAllKeys()) if (!needed.has(hash)) await files.delete(hash);
  await transaction.done;
}
