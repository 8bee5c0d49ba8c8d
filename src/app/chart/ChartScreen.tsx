import { useMemo, useState } from 'preact/hooks';
import type { Engine } from '../../engine/engine.client.ts';
import type { Setup } from '../../engine/setup.ts';
import { Icon } from '../parts/Icon.tsx';
import { ThemeButton } from '../parts/ThemeButton.tsx';
import { filmName } from '../words/names.ts';
import './chart.css';
import { chartEndNm, pocketCardSvg } from './chartSvg.ts';
import { likeColours } from './likeColours.ts';
import { Overview } from './Overview.tsx';
import { ReadingPanel } from './ReadingPanel.tsx';
import { Ruler } from './Ruler.tsx';
import { SetupPanel } from './SetupPanel.tsx';
import { chartSetup } from './setupWords.ts';
import { TakeAway } from './TakeAway.tsx';
import { useChart } from './useChart.ts';

/** Version of the app, from package.json at build time. */
declare const __APP_VERSION__: string;

const FIRST_REACH_NM = 2000;
const FIRST_NM = 250;

type Panel = 'reading' | 'setup' | 'takeAway';
const PANELS: readonly (readonly [Panel, string])[] = [
  ['reading', 'Read'],
  ['setup', 'Set-up'],
  ['takeAway', 'Save'],
];

/**
 * The colours of a film against its thickness, useful by itself: a ruler that runs under a reading line, with where the
 * colour comes back, how well it can be told, and the chart to take away on paper or as a file.
 */
export default function ChartScreen({ engine, setup }: { readonly engine: Engine; readonly setup: Setup }) {
  const [own, setOwn] = useState(() => chartSetup(setup));
  const [reachNm, setReachNm] = useState(FIRST_REACH_NM);
  const [nm, setNm] = useState(FIRST_NM);
  const [panel, setPanel] = useState<Panel>('reading');
  const { drawn, isBusy, failure, again } = useChart(engine, own, reachNm);
  const view = drawn?.view;
  const at = view ? Math.min(nm, chartEndNm(view)) : nm;
  const move = (next: number) => setNm(Math.max(0, Math.min(next, view ? chartEndNm(view) : next)));
  const alike = useMemo(() => (view ? likeColours(view, at) : []), [view, at]);
  const card = useMemo(() => (drawn ? pocketCardSvg(drawn.view, drawn.setup, __APP_VERSION__) : ''), [drawn]);
  return (
    <>
      <main class="chart" aria-busy={isBusy}>
        <header class="bar">
          <a class="button" href="#/" aria-label="Back">
            <Icon name="back" />
          </a>
          <h1>{filmName(own.film)}</h1>
          <ThemeButton />
        </header>
        {view ? (
          <div class={`chart-stage${isBusy ? ' is-old' : ''}`}>
            <Ruler view={view} at={at} onMove={move} />
            <Overview view={view} at={at} alike={alike} onMove={move} />
          </div>
        ) : (
          <div class="chart-stage chart-empty">
            <p class="quiet" role="status">
              {failure ? 'No chart yet.' : 'Working out the colours …'}
            </p>
          </div>
        )}
        <div class="chart-sheet">
          {failure ? (
            <div role="alert" class="chart-failure">
              <p class="warn">{failure}</p>
              <button type="button" onClick={again}>
                Try again
              </button>
            </div>
          ) : null}
          {panel === 'setup' ? (
            <SetupPanel setup={own} reachNm={reachNm} onSetup={setOwn} onReach={setReachNm} />
          ) : null}
          {panel === 'takeAway' && drawn ? <TakeAway view={drawn.view} setup={drawn.setup} /> : null}
          {panel === 'reading' && view ? (
            <ReadingPanel view={view} at={at} alike={alike} onMove={move} />
          ) : null}
          <nav class="chart-tabs" aria-label="Chart">
            {PANELS.map(([id, name]) => (
              <button key={id} type="button" aria-pressed={panel === id} onClick={() => setPanel(id)}>
                {name}
              </button>
            ))}
          </nav>
        </div>
      </main>
      {/* Only on paper. Built by our own drawing, every text in it escaped. */}
      <div class="chart-card" dangerouslySetInnerHTML={{ __html: card }} />
    </>
  );
}
