import { signal } from '@preact/signals';
import { useEffect, useState } from 'preact/hooks';
import { timeWords } from '../../record/inWords.ts';
import type { Observation } from '../../record/observation.ts';
import type { ObservationEntry } from '../../record/store.browser.ts';
import { Icon } from '../parts/Icon.tsx';
import { attempt, shown, theDesk, theStore } from './desk.ts';
import { amountLine } from './figures.ts';
import { ScreenBar } from './ScreenBar.tsx';
import { Thumbnail } from './Thumbnail.tsx';

/** The record last deleted, until something else is done: it can come back. */
export const removed = signal<{ readonly id: string; readonly title: string } | null>(null);

/** All records on this device, the last changed first. */
export function RecordList() {
  const [query, setQuery] = useState('');
  const [entries, setEntries] = useState<readonly ObservationEntry[] | null>(null);
  const [unkept, setUnkept] = useState<readonly Observation[]>([]);
  const [warning, setWarning] = useState<string | null>(null);
  const [turn, setTurn] = useState(0);
  // A new turn asks for the list anew.
  useEffect(() => {
    let stale = false;
    void theDesk()
      .unkept()
      .then((found) => {
        if (!stale) setUnkept(found);
      });
    void attempt('reading the records', async () => {
      const store = await theStore();
      const found = await store.list(query);
      const { warning: full } = await store.storage();
      if (stale) return;
      setEntries(found);
      setWarning(full);
    });
    return () => {
      stale = true;
    };
  }, [query, turn]);

  const bringBack = () =>
    void attempt('bringing it back', async () => {
      if (removed.value) await (await theStore()).undoRemove(removed.value.id);
      removed.value = null;
      setTurn(turn + 1);
    });
  const pickZip = async (event: Event & { currentTarget: HTMLInputElement }) => {
    const input = event.currentTarget;
    const file = input.files?.[0];
    if (!file) return;
    const found = await attempt('reading the ZIP', () => theDesk().importZip(file));
    input.value = '';
    if (!found) return;
    shown.value = found;
    location.hash = `#/records/${found.observation.id}`;
  };

  return (
    <main class="page records">
      <ScreenBar title="Records" back="Back to the start" to="#/" />
      <label class="field">
        <span>Search</span>
        <input
          type="search"
          placeholder="place, oil, date, remark"
          value={query}
          onInput={(event) => setQuery(event.currentTarget.value)}
        />
      </label>
      {warning ? <p class="note warn small">{warning}</p> : null}
      {removed.value ? (
        <div class="undo" role="status">
          <span>Deleted: {removed.value.title}</span>
          <button type="button" onClick={bringBack}>
            <Icon name="undo" />
            Undo
          </button>
        </div>
      ) : null}
      {unkept.length > 0 ? (
        <section class="not-kept" aria-label="Not kept yet">
          <p class="warn">Only in memory until this page closes: open it and save it as a ZIP.</p>
          <ul class="record-list">
            {unkept.map((observation) => (
              <li key={observation.id}>
                <Entry entry={{ id: observation.id, observation, problem: null }} />
              </li>
            ))}
          </ul>
        </section>
      ) : null}
      {entries?.length === 0 && unkept.length === 0 ? (
        <p class="quiet">
          {query.trim()
            ? 'No record has these words.'
            : 'Nothing saved yet. Measure a photo and tap “Save record”, or bring in a ZIP.'}
        </p>
      ) : null}
      <ul class="record-list">
        {entries?.map((entry) => (
          <li key={entry.id}>
            <Entry entry={entry} />
          </li>
        ))}
      </ul>
      <div class="low">
        <div class="row tight">
          <label class="button">
            <Icon name="open" />
            Import a ZIP
            <input
              class="hidden-input"
              type="file"
              accept=".zip,application/zip"
              onChange={(event) => void pickZip(event)}
            />
          </label>
          <a class="button" href="#/records/new">
            <Icon name="plus" />
            Without a photo
          </a>
        </div>
      </div>
    </main>
  );
}

function Entry({ entry }: { readonly entry: ObservationEntry }) {
  const { observation } = entry;
  if (!observation) {
    return <p class="note warn small">{entry.problem} It stays on this device.</p>;
  }
  return (
    <a class="record-link" href={`#/records/${entry.id}`}>
      <Thumbnail observation={observation} />
      <span>
        <strong>{observation.title || 'Untitled record'}</strong>
        <span>{amountLine(observation)}</span>
        <span class="quiet">{observation.time ? timeWords(observation.time) : 'time not known'}</span>
      </span>
    </a>
  );
}
