import { type DBSchema, type IDBPDatabase, type IDBPTransaction, openDB } from 'idb';

export interface StoredObservation {
  readonly id: string;
  /** As it was saved, maybe by an older version: read it by `readObservation`. */
  readonly observation: unknown;
  /** SHA-256 of its files, so that files without an observation can be found. */
  readonly fileHashes: readonly string[];
  /** Milliseconds since 1970 where it was deleted and can still come back. */
  readonly deletedAt: number | null;
}

export interface RecordTables extends DBSchema {
  observations: { key: string; value: StoredObservation };
  /**
   * Bytes by their SHA-256: copies of an observation share them. Bytes rather than Blobs, which some WebKit versions
   * fail to store.
   */
  files: { key: string; value: Uint8Array };
}

export type RecordDatabase = IDBPDatabase<RecordTables>;
type Upgrade = (
  database: RecordDatabase,
  transaction: IDBPTransaction<RecordTables, ('observations' | 'files')[], 'versionchange'>,
) => void;

/** Step i lifts the database from version i to i + 1; steps are only ever added. */
export const UPGRADES: readonly Upgrade[] = [
  (database) => {
    database.createObjectStore('observations', { keyPath: 'id' });
    database.createObjectStore('files');
  },
];

/** Opens the database, lifted to the last version; another page that wants a newer one is not held up. */
export function openDatabase(
  name: string,
  onClosed: () => void,
  upgrades: readonly Upgrade[] = UPGRADES,
): Promise<RecordDatabase> {
  return openDB<RecordTables>(name, upgrades.length, {
    upgrade: (database, from, _to, transaction) => {
      for (const step of upgrades.slice(from)) step(database, transaction);
    },
    blocking: (_current, _blocked, event) => {
      (event.target as IDBDatabase).close();
      onClosed();
    },
    terminated: onClosed,
  });
}
