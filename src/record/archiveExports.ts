import { messageText } from './messageText.ts';
import type { Observation } from './observation.ts';
import { type ReportOptions, reportDocument } from './report.ts';
import { resultsCsv } from './resultsCsv.ts';

/**
 * What people and programs read beside the record, for `exports` of `writeArchive`: the report, the table of results and
 * the message. They say what the observation says, so one without its position makes exports without it.
 */
export function archiveExports(observation: Observation, options: ReportOptions = {}): Map<string, string> {
  return new Map([
    ['report.html', reportDocument(observation, options)],
    ['results.csv', resultsCsv(observation)],
    ['message.txt', `${messageText(observation)}\n`],
  ]);
}
