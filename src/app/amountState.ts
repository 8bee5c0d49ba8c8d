import { computed, effect, signal } from '@preact/signals';
import type { EstimateResult } from '../engine/contract.ts';
import { withWholeView } from '../engine/partialView.ts';
import type { Setup } from '../engine/setup.ts';
import type { TallyOptions, TallyReport } from '../engine/tallyContract.ts';
import type { AppearanceCode, AppearanceShares } from '../tally/appearanceCode.ts';
import { withObserverShares } from '../tally/appearanceShares.ts';
import { rememberedObserver } from './records/observerMemory.ts';
import { theEngine } from './session.ts';
import { image, result, setup } from './state.ts';
import { lensFacts } from './viewState.ts';

export type GivenShares = Readonly<Partial<Record<AppearanceCode, number>>>;
export type Viewpoint = NonNullable<TallyOptions['viewpoint']>;
export type Polariser = NonNullable<TallyOptions['polariser']>;

/** The amount last worked out, and what it was worked out from. */
const last = signal<{
  readonly report: TallyReport | null;
  readonly result: EstimateResult;
  readonly setup: Setup;
} | null>(null);

/** How much there is; null while that has not been worked out from the present map and set-up. */
export const tally = computed<TallyReport | null>(() =>
  last.value && last.value.result === result.value && last.value.setup === setup.value
    ? last.value.report
    : null,
);
export const tallyFault = signal<string | null>(null);
/** Shares that the observer gave; the map's fill what is left. */
export const givenShares = signal<GivenShares>({});
/** Film past the end of colour counts as Rainbow (2), or as Metallic (3) where the observer saw a mirror. */
export const atLeastCode = signal<2 | 3>(2);
/** People come back to the same kind of place. */
export const viewpoint = signal<Viewpoint>(rememberedPlace());
export const polariser = signal<Polariser>('unknown');

function rememberedPlace(): Viewpoint {
  const from = rememberedObserver()?.from;
  return from === undefined || from === 'bench' ? 'unknown' : from;
}

/** The map's shares with the observer's word over them; null where they do not make 100 %. */
export function ownShares(ofMap: AppearanceShares | null, given: GivenShares): AppearanceShares | null {
  if (Object.keys(given).length === 0) return null;
  try {
    return withObserverShares(ofMap ?? [0, 0, 0, 0, 0], given);
  } catch {
    return null;
  }
}

let photoSpokenOf: unknown = null;

/** Only the last question's answer counts. */
let asked = 0;

/** Works the amount out anew, from the last map and what the observer says. */
export async function workOutAmount(): Promise<void> {
  const [ofResult, ofSetup] = [result.value, setup.value];
  if (!ofResult) return;
  const mine = ++asked;
  const shares = ownShares(tally.value?.shares.ofMap ?? null, givenShares.value);
  try {
    const engine = await theEngine();
    const report = await engine.tally({
      setup: withWholeView(ofSetup, lensFacts()),
      atLeastCode: atLeastCode.value,
      viewpoint: viewpoint.value,
      polariser: polariser.value,
      ...(shares && { shares }),
    }).promise;
    if (mine !== asked) return;
    tallyFault.value = null;
    last.value = { report, result: ofResult, setup: ofSetup };
    // The map's own shares were needed first to fill up what the observer gave.
    if (report?.shares.from === 'map' && ownShares(report.shares.ofMap, givenShares.value))
      await workOutAmount();
  } catch (error) {
    if (mine === asked) tallyFault.value = error instanceof Error ? error.message : String(error);
  }
}

/** What was said of one photo is not said of the next. */
effect(() => {
  if (image.value === photoSpokenOf) return;
  photoSpokenOf = image.value;
  givenShares.value = {};
  atLeastCode.value = 2;
  polariser.value = 'unknown';
  tallyFault.value = null;
  last.value = null;
});
