/** Runs in the test page: a page of an app with things of its own, which prints a report. */
import type { Observation } from '../../src/record/observation.ts';
import { printReport } from '../../src/record/printReport.browser.ts';
import { reportMarkup } from '../../src/record/report.ts';

const inPage = {
  /** Resolves where the dialogue would open; the browser's own printing then ends it. */
  start: (observation: Observation, url: string) =>
    printReport(reportMarkup(observation, { picture: { url, topNm: 600 } }), () => {}),
};

declare global {
  var printTests: typeof inPage;
}
globalThis.printTests = inPage;
