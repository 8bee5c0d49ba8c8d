import { hand, mapFile, rowsFile, summaryFile } from './exportFiles.ts';
import { failure, image, result, setup } from './state.ts';

const stem = () => (image.value?.name ?? 'photo').replace(/\.[^.]*$/, '');

export async function exportMap(): Promise<void> {
  if (!result.value) return;
  try {
    hand(`${stem()}-map.png`, await mapFile(result.value));
  } catch (error) {
    failure.value = error instanceof Error ? error.message : String(error);
  }
}

export function exportRows(): void {
  if (result.value) hand(`${stem()}-rows.csv`, rowsFile(result.value));
}

export function exportSummary(): void {
  if (!result.value || !image.value) return;
  const { name, opened } = image.value;
  hand(
    `${stem()}-summary.json`,
    summaryFile(setup.value, result.value, { name, sha256: opened.metadata.sha256 }),
  );
}
