import { useEffect, useState } from 'preact/hooks';
import type { Engine } from '../engine/engine.client.ts';
import { SimpleChart } from './SimpleChart.tsx';
import { theEngine } from './session.ts';
import { setup } from './state.ts';

/** Gives the chart screen its engine. */
export function ChartRoute() {
  const [engine, setEngine] = useState<Engine | null>(null);
  useEffect(() => {
    void theEngine().then(setEngine);
  }, []);
  return engine ? (
    <SimpleChart engine={engine} setup={setup.value} />
  ) : (
    <main class="page" aria-busy="true" />
  );
}
