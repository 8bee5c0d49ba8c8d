import { signal } from '@preact/signals';
import { finished } from '../../engine/newObservation.ts';
import { createRecordDesk, type RecordDesk } from '../../engine/recordDesk.client.ts';
import type { KeptRecord } from '../../engine/recordJobs.ts';
import type { Observation } from '../../record/observation.ts';
import { openStore, type RecordStore } from '../../record/store.browser.ts';

let desk: RecordDesk | null = null;
let store: Promise<RecordStore> | null = null;

/** The worker that keeps records and writes their files, started when first needed. */
export function theDesk(): RecordDesk {
  desk ??= createRecordDesk();
  return desk;
}

/** The records' storage, for what is light: lists, thumbnails, deleting and its undo. */
export function theStore(): Promise<RecordStore> {
  store ??= openStore().catch((error: unknown) => {
    store = null;
    throw error;
  });
  return store;
}

/** The record on the screen. */
export const shown = signal<KeptRecord | null>(null);
/** What went wrong last, as a sentence. */
export const trouble = signal<string | null>(null);
/** Words for what is being done, while it takes long. */
export const doing = signal<string | null>(null);

/** Words are shown only for what takes longer than this, ms. */
const SHOW_AFTER_MS = 300;

/** Runs one thing with words for the waiting; what goes wrong becomes a sentence. */
export async function attempt<T>(words: string, work: () => Promise<T>): Promise<T | null> {
  const show = setTimeout(() => {
    doing.value = words;
  }, SHOW_AFTER_MS);
  trouble.value = null;
  try {
    return await work();
  } catch (error) {
    trouble.value = error instanceof Error ? error.message : String(error);
    return null;
  } finally {
    clearTimeout(show);
    doing.value = null;
  }
}

/** Shows the record of that id; one just saved is shown already. */
export async function show(id: string): Promise<void> {
  if (shown.value?.observation.id === id) return;
  shown.value = null;
  const found = await attempt('opening the record', () => theDesk().open(id));
  if (found) shown.value = found;
}

/** Changes are kept this long after the last of a row of key strokes, ms. */
const KEEP_AFTER_MS = 400;
let waiting: ReturnType<typeof setTimeout> | null = null;
let keeping: Promise<void> = Promise.resolve();

/** Changes the words of the record on the screen; they are kept without being asked for. */
export function edit(change: (observation: Observation) => Observation): void {
  const before = shown.value;
  if (!before) return;
  const observation = finished({
    ...change(before.observation),
    changedUtc: new Date().toISOString(),
  });
  shown.value = { ...before, observation };
  if (waiting) clearTimeout(waiting);
  waiting = setTimeout(() => void flush(), KEEP_AFTER_MS);
}

/** Keeps now what was changed; to be awaited before the record is handed over or left. */
export function flush(): Promise<void> {
  if (waiting) {
    clearTimeout(waiting);
    waiting = null;
    const record = shown.value;
    if (record) keeping = keeping.then(() => keep(record.observation));
  }
  return keeping;
}

async function keep(observation: Observation): Promise<void> {
  const kept = await attempt('saving', () => theDesk().revise(observation));
  // What was typed in the meantime stays.
  const now = shown.value;
  if (kept && now?.observation.id === observation.id) shown.value = { ...now, problem: kept.problem };
}

/** Tries once more to keep what could not be kept. */
export async function retry(): Promise<void> {
  const before = shown.value;
  if (!before) return;
  await flush();
  const kept = await attempt('saving', () => theDesk().retry(before.observation.id));
  if (kept) shown.value = kept;
}

addEventListener('pagehide', () => void flush());
// What lives in memory only would be gone: the browser asks first.
addEventListener('beforeunload', (event) => {
  if (shown.value?.problem) event.preventDefault();
});
