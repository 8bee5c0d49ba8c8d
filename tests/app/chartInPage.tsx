/** The chart screen alone in a page, with an engine that draws real charts but has no workers and no photo. */
import { render } from 'preact';
import '../../src/app/app.css';
import ChartScreen from '../../src/app/chart/ChartScreen.tsx';
import { chartFor } from '../../src/engine/chartFor.ts';
import type { ChartView, Job } from '../../src/engine/contract.ts';
import type { Engine } from '../../src/engine/engine.client.ts';
import type { Setup } from '../../src/engine/setup.ts';

declare global {
  var chartTests: {
    /** Sentence of which the next charts fail; empty: none. */
    failWith: string;
    asked: { setup: Setup; maxThicknessNm: number }[];
    show: (setup: Setup) => void;
  };
}

const never = (): never => {
  throw new Error('The chart screen asks for charts only.');
};

const engine: Engine = {
  openPhoto: never,
  estimate: never,
  preview: never,
  probe: never,
  tally: never,
  target: never,
  dispose: never,
  chart: (setup, maxThicknessNm): Job<ChartView> => {
    chartTests.asked.push({ setup, maxThicknessNm });
    const { failWith } = chartTests;
    return {
      promise: failWith
        ? Promise.reject(new Error(failWith))
        : Promise.resolve().then(() => chartFor(setup, maxThicknessNm)),
      cancel: never,
    };
  },
};

globalThis.chartTests = {
  failWith: '',
  asked: [],
  show: (setup) => {
    render(null, document.body);
    render(<ChartScreen engine={engine} setup={setup} />, document.body);
  },
};
