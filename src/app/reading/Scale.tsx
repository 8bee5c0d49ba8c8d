import { useLayoutEffect, useRef } from 'preact/hooks';
import type { Probe } from '../../engine/contract.ts';
import { orderStep } from '../mapPicture.ts';
import { orderText } from '../words/numbers.ts';
import { PosteriorCurve } from './PosteriorCurve.tsx';
import { scaleTopNm } from './scaleTop.ts';
import { ticksTo } from './ticks.ts';

const css = (ramp: Uint8Array, step: number) =>
  `rgb(${ramp[3 * step]} ${ramp[3 * step + 1]} ${ramp[3 * step + 2]})`;

/** The legend of the map is the axis of the reading: what a colour means and how likely it is stand on one scale. */
export function Scale({
  ramp,
  topNm,
  probe,
}: {
  readonly ramp: Uint8Array;
  readonly topNm: number;
  readonly probe: Probe | null;
}) {
  const canvas = useRef<HTMLCanvasElement>(null);
  const endNm = scaleTopNm(topNm, probe);
  // Before the page is drawn: a scale without its colours must not be seen.
  useLayoutEffect(() => {
    const context = canvas.current?.getContext('2d');
    if (!context) return;
    for (let i = 0; i < 256; i++) {
      context.fillStyle = css(ramp, Math.min(255, Math.round((i * endNm) / topNm)));
      context.fillRect(i, 0, 1, 1);
    }
  }, [ramp, endNm, topNm]);
  return (
    <figure class="legend" aria-label="Thickness scale">
      {probe ? <PosteriorCurve probe={probe} endNm={endNm} /> : null}
      <canvas ref={canvas} width={256} height={1} />
      <ol>
        {ticksTo(endNm, 3.9).map(({ nm, text }) => (
          <li key={nm} class={nm > 0.93 * endNm ? 'end' : ''} style={{ left: `${(100 * nm) / endNm}%` }}>
            {text}
          </li>
        ))}
      </ol>
    </figure>
  );
}

/** Legend of the order map: a swatch for every order on it. */
export function OrderScale({ ramp, orders }: { readonly ramp: Uint8Array; readonly orders: number }) {
  return (
    <figure class="legend orders" aria-label="Interference orders">
      {Array.from({ length: orders }, (_, i) => i + 1).map((order) => (
        <span key={order}>
          <svg viewBox="0 0 1 1" preserveAspectRatio="none" role="img" aria-label={orderText(order)}>
            <rect width="1" height="1" fill={css(ramp, Math.round(255 * orderStep(order)))} />
          </svg>
          <span aria-hidden="true">{order}</span>
        </span>
      ))}
    </figure>
  );
}
