import type { TallyReport } from '../../engine/tallyContract.ts';
import { APPEARANCES, type AppearanceCode, type AppearanceShares } from '../../tally/appearanceCode.ts';
import { type GivenShares, givenShares, ownShares, workOutAmount } from '../amountState.ts';
import { Icon } from '../parts/Icon.tsx';
import { wholePercents } from '../words/numbers.ts';

/** How far − and + move a share, of 100. */
const STEP = 5;

/** Shares of the five appearances: the map's, or the observer's own call, always 100 together. */
export function AmountShares({ report }: { readonly report: TallyReport }) {
  const { ofMap } = report.shares;
  const given = givenShares.value;
  const own = ownShares(ofMap, given);
  const used = own ?? ofMap;
  const isGiven = Object.keys(given).length > 0;
  const percents = used ? wholePercents(used) : null;
  const set = (code: AppearanceCode, percent: number) => {
    givenShares.value = withShare(given, ofMap, code, percent / 100);
    void workOutAmount();
  };
  return (
    <>
      <div class="split">
        <h2>Shares by look</h2>
        {isGiven ? (
          <button
            type="button"
            class="plain"
            onClick={() => {
              givenShares.value = {};
              void workOutAmount();
            }}
          >
            As the map says
          </button>
        ) : null}
      </div>
      <p class="small quiet">
        {isGiven
          ? 'Your own call. The others share what is left; together 100 %.'
          : percents
            ? 'As the film’s colours say. Change them to what you saw; true colour is for your eye alone.'
            : 'No film thick enough to have a code. Give shares by eye where you saw some.'}
      </p>
      <ul class="shares-list">
        {APPEARANCES.map(({ code, name, minUm, maxUm, openEnded }) => {
          const percent = percents?.[code - 1] ?? 0;
          return (
            <li key={code}>
              <span>
                <i class={`i-code-${code}`} />
                <span>
                  {code} {name}
                  <small>{openEnded ? `over ${minUm} µm` : `${minUm} to ${maxUm} µm`}</small>
                </span>
              </span>
              <div class="stepper">
                <button
                  type="button"
                  aria-label={`${name}: less`}
                  disabled={percent === 0}
                  onClick={() => set(code, Math.max(0, Math.ceil(percent / STEP) * STEP - STEP))}
                >
                  <Icon name="minus" />
                </button>
                <output aria-label={`Share of ${name}`}>{percent} %</output>
                <button
                  type="button"
                  aria-label={`${name}: more`}
                  disabled={percent === 100}
                  onClick={() => set(code, Math.min(100, Math.floor(percent / STEP) * STEP + STEP))}
                >
                  <Icon name="plus" />
                </button>
              </div>
            </li>
          );
        })}
      </ul>
    </>
  );
}

/**
 * The observer's shares with one changed. What the others hold beyond 100 % is taken from the last of them first, so that a
 * share can always be raised; where the map has nothing to fill the rest, the first class takes it.
 */
export function withShare(
  given: GivenShares,
  ofMap: AppearanceShares | null,
  code: AppearanceCode,
  share: number,
): GivenShares {
  const next: Partial<Record<AppearanceCode, number>> = { ...given, [code]: share };
  let over = Object.values(next).reduce((sum, part) => sum + part, 0) - 1;
  for (const { code: other } of [...APPEARANCES].reverse()) {
    const held = next[other];
    if (over <= 1e-9 || other === code || held === undefined) continue;
    const taken = Math.min(held, over);
    next[other] = held - taken;
    over -= taken;
  }
  if (ownShares(ofMap, next)) return next;
  // Nothing of the map is left to fill up to 100 %.
  const filler = code === 1 ? 2 : 1;
  const rest = 1 - Object.values(next).reduce((sum, part) => sum + part, 0);
  return { ...next, [filler]: (next[filler] ?? 0) + rest };
}
