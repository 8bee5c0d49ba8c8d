import { footLine, hand, rowsFile, summaryFile } from './exportFiles.ts';
import { failure, image, progress, result, setup } from './state.ts';

const stem = () => (image.value?.name ?? 'photo').replace(/\.[^.]*$/, '');
/** Progress is shown only for what takes longer than this, ms. */
const SHOW_AFTER_MS = 300;

/** Writes a file and hands it over; what goes wrong becomes a sentence. */
async function write(name: string, words: string, make: () => Promise<Blob>): Promise<void> {
  const show = setTimeout(() => {
    progress.value = { share: 0, step: words };
  }, SHOW_AFTER_MS);
  try {
    failure.value = null;
    hand(name, await make());
  } catch (error) {
    failure.value = error instanceof Error ? error.message : String(error);
  } finally {
    clearTimeout(show);
    progress.value = null;
  }
}

export async function exportMap(): Promise<void> {
  const done = result.value;
  if (!done) return;
  // The painter comes lazily: it brings the colour library.
  await write(`${stem()}-map.png`, 'writing the map', async () =>
    (await import('./mapFile.ts')).mapFile(done.map, footLine(stem())),
  );
}

export async function exportRows(): Promise<void> {
  const done = result.value;
  if (done) await write(`${stem()}-rows.csv`, 'writing the rows', () => rowsFile(done));
}

export async function exportSummary(): Promise<void> {
  const done = result.value;
  const shown = image.value;
  if (!done || !shown) return;
  const photo = { name: shown.name, sha256: shown.opened.metadata.sha256 };
  await write(`${stem()}-summary.json`, 'writing the summary', async () =>
    summaryFile(setup.value, done, photo),
  );
}
