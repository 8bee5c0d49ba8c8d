import type { ChartView } from '../../engine/contract.ts';
import { intervalText, orderText } from '../words/numbers.ts';
import { chartEndNm } from './chartSvg.ts';
import { intervalAt, type LikeColour, orderAt, placeInRange } from './likeColours.ts';
import { colourAt } from './rulerColumn.ts';

const STEP_NM = 5;
/** About one order of any film: an interval as wide tells nothing that the order did not. */
const WIDEST_NM = 200;
/** What one row of a phone holds. */
const MOST_LIKE = 3;

/** What the colour under the line can say, in one sentence. */
export function certaintyWords(view: ChartView, nm: number): string {
  const place = placeInRange(view, nm);
  if (place === 'tooThin') return 'Too thin to tell from none by colour.';
  if (place === 'tooThick') {
    const bound = Math.floor(view.resolvableNm.toNm / 50) * 50;
    return `Too pale to tell: say at least ${bound.toLocaleString('en-GB')} nm.`;
  }
  const { lowNm, highNm } = intervalAt(view, nm);
  if (highNm - lowNm > WIDEST_NM || highNm >= chartEndNm(view)) {
    return 'Hardly any change of colour: a look cannot tell.';
  }
  return `Order known: ${intervalText(lowNm, highNm)} nm (90\u00a0%).`;
}

/** The thickness under the line: colour, order, how well it can be told, and where else the colour comes back. */
export function ReadingPanel({
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
  return (
    <section aria-label="Reading" class="chart-reading">
      <div class="chart-figure">
        <button type="button" aria-label={`Thinner by ${STEP_NM} nm`} onClick={() => onMove(at - STEP_NM)}>
          −
        </button>
        <span class="chart-swatch" style={{ background: colourAt(view, at) }} />
        <p>
          <strong class="reading">{at.toLocaleString('en-GB')} nm</strong>
          <span class="quiet">{orderText(orderAt(at, view.orderBoundariesNm))}</span>
        </p>
        <button type="button" aria-label={`Thicker by ${STEP_NM} nm`} onClick={() => onMove(at + STEP_NM)}>
          +
        </button>
      </div>
      <p class="small quiet chart-certainty">{certaintyWords(view, at)}</p>
      <div class="chart-likes">
        {alike.length === 0 ? (
          <p class="small quiet">No other order has this colour.</p>
        ) : (
          <>
            <p class="small quiet">Like</p>
            {alike.slice(0, MOST_LIKE).map(({ thicknessNm, order }) => (
              <button
                key={thicknessNm}
                type="button"
                class="plain"
                aria-label={`Go to ${thicknessNm} nm, ${orderText(order)}`}
                onClick={() => onMove(thicknessNm)}
              >
                <i style={{ background: colourAt(view, thicknessNm) }} />
                {thicknessNm.toLocaleString('en-GB')}
              </button>
            ))}
          </>
        )}
      </div>
    </section>
  );
}
