import { useMemo } from 'preact/hooks';
import type { ChartView } from '../../engine/contract.ts';
import { chartEndNm } from './chartSvg.ts';
import { orderAt } from './likeColours.ts';
import { rulerColumn } from './rulerColumn.ts';
import { useRuler } from './useRuler.ts';

const KEY_STEPS_NM: Readonly<Record<string, number>> = {
  ArrowUp: -1,
  ArrowLeft: -1,
  ArrowDown: 1,
  ArrowRight: 1,
  PageUp: -50,
  PageDown: 50,
};

/** Below this width, pixels, the figures are set smaller. */
const NARROW = 270;

export interface RulerProps {
  readonly view: ChartView;
  readonly at: number;
  readonly onMove: (nm: number) => void;
}

/**
 * The ruler at one pixel a nanometre, running under a fixed line: scroll it, tap a colour, or use the keys. What lies
 * under the line is what is read, so a thumb never covers it.
 */
export function Ruler({ view, at, onMove }: RulerProps) {
  const endNm = chartEndNm(view);
  const { scroller, width, goTo, onScroll } = useRuler(at, endNm, onMove);
  const drawing = useMemo(
    () =>
      rulerColumn(view, {
        fromNm: 0,
        toNm: endNm,
        x: 0,
        y: 0,
        width,
        height: endNm,
        fontSize: width < NARROW ? 12 : 14,
      }).text,
    [view, endNm, width],
  );
  const onKeyDown = (event: KeyboardEvent) => {
    const step = KEY_STEPS_NM[event.key];
    const next = event.key === 'Home' ? 0 : event.key === 'End' ? endNm : step ? at + step : null;
    if (next === null) return;
    event.preventDefault();
    goTo(next);
  };
  return (
    <div class="chart-ruler">
      <p class="chart-heads" aria-hidden="true">
        <span>nm</span>
        <span />
        <span>order</span>
        <span title="Colour change a nanometre">ΔE/nm</span>
        <span title="A like colour of another order, at that thickness">like</span>
      </p>
      <div class="chart-window">
        <div
          ref={scroller}
          class="chart-scroll"
          role="slider"
          tabIndex={0}
          aria-label="Thickness on the colour ruler"
          aria-orientation="vertical"
          aria-valuemin={0}
          aria-valuemax={endNm}
          aria-valuenow={at}
          aria-valuetext={`${at} nanometres, order ${orderAt(at, view.orderBoundariesNm)}`}
          onScroll={onScroll}
          onKeyDown={onKeyDown}
        >
          <svg
            viewBox={`0 0 ${width} ${endNm}`}
            width={width}
            height={endNm}
            aria-hidden="true"
            onClick={(event) => goTo(event.clientY - event.currentTarget.getBoundingClientRect().top)}
            // Built by our own drawing, every text in it escaped.
            dangerouslySetInnerHTML={{ __html: drawing }}
          />
        </div>
        <i class="chart-line" aria-hidden="true" />
      </div>
    </div>
  );
}
