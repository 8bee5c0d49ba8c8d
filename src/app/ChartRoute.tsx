import { useEffect, useState } from 'preact/hooks';
import type { Engine } from '../engine/engine.client.ts';
import ChartScreen from './chart/ChartScreen.tsx';
import { theEngine } from './session.ts';
import { setup } from './state.ts';

/** Gives the chart screen its engine. */
export function ChartRoute() {
  const [engine, setEngine] = useState<Engine | null>(null);
  useEffect(() => {
    void theEngine().then(setEngine);
  }, []);
  return engine ? (
    <ChartScreen engine={engine} setup={setup.value} />
  ) : (
    <main class="page" aria-busy="true" />
  );
}
