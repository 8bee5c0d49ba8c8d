import { useMemo } from 'preact/hooks';
import type { ChartView } from '../../engine/contract.ts';
import { chartEndNm } from './chartSvg.ts';
import type { LikeColour } from './likeColours.ts';
import { strips } from './rulerColumn.ts';

const STRIPS = 400;

/** The whole ruler at a glance, with the reading and its like colours marked; a tap goes there. */
export function Overview({
  view,
  at,
  alike,
  onMove,
}: {
  readonly view: ChartView;
  readonly at: number;
  readonly alike: readonly LikeColour[];
  readonly onMove: (nm: number) => void;
}) {
  const endNm = chartEndNm(view);
  const drawing = useMemo(
    () =>
      strips(view, { fromNm: 0, toNm: endNm, x: 12, y: 0, width: 28, height: 1000 }, STRIPS)
        .map(({ text }) => text)
        .join(''),
    [view, endNm],
  );
  const top = (nm: number) => `${(100 * nm) / endNm}%`;
  return (
    // The ruler is the control for keys and screen readers; this is a shortcut for the thumb.
    <div
      class="chart-overview"
      aria-hidden="true"
      onClick={(event) => {
        const box = event.currentTarget.getBoundingClientRect();
        onMove(Math.round((endNm * (event.clientY - box.top)) / box.height));
      }}
    >
      <svg viewBox="0 0 48 1000" preserveAspectRatio="none" dangerouslySetInnerHTML={{ __html: drawing }} />
      <i
        class="chart-range"
        style={{
          top: top(view.resolvableNm.fromNm),
          bottom: `${100 - (100 * view.resolvableNm.toNm) / endNm}%`,
        }}
      />
      {alike.map(({ thicknessNm }) => (
        <i key={thicknessNm} class="chart-alike" style={{ top: top(thicknessNm) }} />
      ))}
      <i class="chart-here" style={{ top: top(at) }} />
    </div>
  );
}
