import type { ExportKind, HandOverChoice } from '../../engine/recordJobs.ts';
import { messageText } from '../../record/messageText.ts';
import type { Observation } from '../../record/observation.ts';
import { printReport } from '../../record/printReport.browser.ts';
import { withoutPosition } from '../../record/redact.ts';
import { reportMarkup } from '../../record/report.ts';
import { webSha256 } from '../../record/sha256.browser.ts';
import { footLine, hand } from '../exportFiles.ts';
import { flush, theDesk } from './desk.ts';

/** Writes a file in the worker and hands it to the person. @returns what they must know before passing it on */
export async function handOver(kind: ExportKind, choice: HandOverChoice): Promise<readonly string[]> {
  await flush();
  const { blob, name, notices } = await theDesk().write(kind, choice);
  hand(name, blob);
  return notices;
}

/** The observation as it is handed over, without its files: for what only quotes its words. */
export async function wordsOf(
  observation: Observation,
  { withoutPosition: leaves, keepOriginal }: Omit<HandOverChoice, 'id'>,
): Promise<Observation> {
  if (!leaves) return observation;
  const redacted = await withoutPosition(
    { observation, files: new Map() },
    { keepOriginal, sha256: webSha256 },
  );
  return redacted.observation;
}

export async function messageOf(
  observation: Observation,
  choice: Omit<HandOverChoice, 'id'>,
): Promise<string> {
  return messageText(await wordsOf(observation, choice));
}

/** Opens the print dialogue with the report, which also saves it as PDF. */
export async function printRecord(
  observation: Observation,
  choice: Omit<HandOverChoice, 'id'>,
  picture: { readonly url: string; readonly topNm: number } | null,
): Promise<void> {
  const words = await wordsOf(observation, choice);
  await printReport(reportMarkup(words, { picture }));
}

/** The map with scale and key as PNG, at the map's own size. @throws Error without a map */
export async function handOverMap({ id, title, photo }: Observation): Promise<void> {
  const [map, { mapFile }] = await Promise.all([theDesk().map(id), import('../mapFile.ts')]);
  if (!map) throw new Error('This record holds no map: measure its photo, then save the record again.');
  const { fileStem } = await import('../../engine/recordExports.ts');
  const name = photo?.metadata.fileName ?? title;
  hand(`${fileStem({ title })}-map.png`, await mapFile(map, footLine(name)));
}
