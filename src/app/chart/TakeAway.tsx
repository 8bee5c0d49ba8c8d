import { useState } from 'preact/hooks';
import type { ChartView } from '../../engine/contract.ts';
import { hand } from '../exportFiles.ts';
import { chartCsv } from './chartCsv.ts';
import { chartSvg } from './chartSvg.ts';
import { type ChartSetup, fileStem } from './setupWords.ts';
import { svgToPng } from './svgToPng.ts';

/** Version of the app, from package.json at build time. */
declare const __APP_VERSION__: string;

/** Files and the pocket card. */
export function TakeAway({ view, setup }: { readonly view: ChartView; readonly setup: ChartSetup }) {
  const [failure, setFailure] = useState<string | null>(null);
  const stem = `chart-${fileStem(setup)}`;
  const sheet = () => chartSvg(view, setup, __APP_VERSION__);
  const picture = async () => {
    setFailure(null);
    try {
      hand(`${stem}.png`, await svgToPng(sheet()));
    } catch (error) {
      setFailure(error instanceof Error ? error.message : String(error));
    }
  };
  return (
    <section aria-label="Save" class="chart-takeaway">
      <button type="button" class="primary" onClick={() => print()}>
        Print a pocket card
      </button>
      <div class="chart-files">
        <button type="button" onClick={() => void picture()}>
          PNG
        </button>
        <button
          type="button"
          onClick={() => hand(`${stem}.svg`, new Blob([sheet()], { type: 'image/svg+xml' }))}
        >
          SVG
        </button>
        <button
          type="button"
          onClick={() => hand(`${stem}.csv`, new Blob([chartCsv(view, setup)], { type: 'text/csv' }))}
        >
          CSV
        </button>
      </div>
      {failure ? (
        <p role="alert" class="warn">
          {failure}
        </p>
      ) : null}
      <p class="small quiet">The set-up stands on all of them. Cut the card out along its frame.</p>
    </section>
  );
}
