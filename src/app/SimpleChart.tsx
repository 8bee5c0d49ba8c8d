import { useEffect, useRef, useState } from 'preact/hooks';
import type { ChartView } from '../engine/contract.ts';
import type { Engine } from '../engine/engine.client.ts';
import type { Setup } from '../engine/setup.ts';
import { Icon } from './parts/Icon.tsx';
import { filmName } from './words/names.ts';

const MAX_NM = 2000;

/** A tall ruler of the film's colours with thickness and orders; tap to read. */
export function SimpleChart({ engine, setup }: { readonly engine: Engine; readonly setup: Setup }) {
  const [view, setView] = useState<ChartView | null>(null);
  const [at, setAt] = useState(300);
  const canvas = useRef<HTMLCanvasElement>(null);
  useEffect(() => {
    const job = engine.chart(setup, MAX_NM);
    job.promise.then(setView, () => setView(null));
  }, [engine, setup]);
  useEffect(() => {
    const context = canvas.current?.getContext('2d');
    if (!context || !view) return;
    const pixels = context.createImageData(1, view.count);
    for (let j = 0; j < view.count; j++) {
      for (let c = 0; c < 3; c++) pixels.data[4 * j + c] = view.displayRgb[3 * j + c] ?? 0;
      pixels.data[4 * j + 3] = 255;
    }
    context.putImageData(pixels, 0, 0);
  }, [view]);
  const order = view ? 1 + view.orderBoundariesNm.filter((d) => d <= at).length : 1;
  const alike =
    view?.lookAlikes
      .filter((pair) => Math.abs(pair.aNm - at) < 15 || Math.abs(pair.bNm - at) < 15)
      .slice(0, 3) ?? [];
  return (
    <main class="page">
      <div class="bar">
        <a class="button" href="#/" aria-label="Back to the start">
          <Icon name="back" />
        </a>
        <h1>Colours of {filmName(setup.film).toLowerCase()}</h1>
      </div>
      <p class="reading">{at} nm</p>
      <p class="quiet">
        Order {order}
        {alike.length > 0
          ? `; looks like ${alike.map((pair) => `${Math.abs(pair.aNm - at) < 15 ? pair.bNm : pair.aNm} nm`).join(', ')}`
          : ''}
      </p>
      <label class="field">
        Thickness
        <input
          type="range"
          min="0"
          max={MAX_NM}
          step="5"
          value={at}
          onInput={(e) => setAt(Number(e.currentTarget.value))}
        />
      </label>
      <canvas
        ref={canvas}
        class="ruler"
        width={1}
        height={view?.count ?? 1}
        aria-label="Film colours from 0 nm at the top"
        onClick={(event) => {
          const box = event.currentTarget.getBoundingClientRect();
          setAt(Math.round(((event.clientY - box.top) / box.height) * (view?.count ?? 0)));
        }}
      />
      <p class="small quiet">
        {view
          ? `Orders end at ${view.orderBoundariesNm
              .slice(0, 6)
              .map((d) => Math.round(d))
              .join(
                ', ',
              )} nm; colour tells thickness up to about ${Math.round(view.resolvableNm.toNm / 50) * 50} nm.`
          : 'Computing …'}
      </p>
    </main>
  );
}
