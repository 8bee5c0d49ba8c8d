import { useEffect, useState } from 'preact/hooks';
import { Cancelled, type ChartView } from '../../engine/contract.ts';
import type { Engine } from '../../engine/engine.client.ts';
import type { ChartSetup } from './setupWords.ts';

/** A slider that is being dragged asks for many charts; only the one it rests on is worked out. */
const REST_MS = 120;

export interface ChartState {
  /** The chart last worked out, with the set-up it holds for: never shown under another one. */
  readonly drawn: { readonly view: ChartView; readonly setup: ChartSetup } | null;
  readonly isBusy: boolean;
  readonly failure: string | null;
  readonly again: () => void;
}

/** Asks the engine for the chart of a set-up and keeps the last one until the next is there. */
export function useChart(engine: Engine, setup: ChartSetup, reachNm: number): ChartState {
  const [drawn, setDrawn] = useState<ChartState['drawn']>(null);
  const [isBusy, setBusy] = useState(true);
  const [failure, setFailure] = useState<string | null>(null);
  const [tries, setTries] = useState(0);
  useEffect(() => {
    let isStale = false;
    setBusy(true);
    const rest = setTimeout(
      () => {
        engine.chart(setup, reachNm).promise.then(
          (view) => {
            if (isStale) return;
            setDrawn({ view, setup });
            setFailure(null);
            setBusy(false);
          },
          (error: unknown) => {
            if (isStale || error instanceof Cancelled) return;
            setFailure(error instanceof Error ? error.message : String(error));
            setBusy(false);
          },
        );
      },
      drawn ? REST_MS : 0,
    );
    // Not cancelled: that would end the workers, and with them a photo being measured.
    return () => {
      isStale = true;
      clearTimeout(rest);
    };
  }, [engine, setup, reachNm, tries]);
  return { drawn, isBusy, failure, again: () => setTries((count) => count + 1) };
}
