import { effect, signal } from '@preact/signals';
import { withWholeView } from '../engine/setupView.ts';
import type { TallyOptions, TallyReport } from '../engine/tallyContract.ts';
import type { AppearanceCode, AppearanceShares } from '../tally/appearanceCode.ts';
import { withObserverShares } from '../tally/appearanceShares.ts';
import { theEngine } from './session.ts';
import { image, result, setup } from './state.ts';
import { lensFacts } from './viewState.ts';

export type GivenShares = Readonly<Partial<Record<AppearanceCode, number>>>;
export type Viewpoint = NonNullable<TallyOptions['viewpoint']>;
export type Polariser = NonNullable<TallyOptions['polariser']>;

/** How much there is, as last worked out; null until it is. */
export const tally = signal<TallyReport | null>(null);
export const tallyFault = signal<string | null>(null);
/** Shares that the observer gave; the map's fill what is left. */
export const givenShares = signal<GivenShares>({});
/** Film past the end of colour counts as Rainbow (2), or as Metallic (3) where the observer saw a mirror. */
export const atLeastCode = signal<2 | 3>(2);
export const viewpoint = signal<Viewpoint>('unknown');
export const polariser = signal<Polariser>('unknown');

/** The map's shares with the observer's word over them; null where they do not make 100 %. */
export function ownShares(ofMap: AppearanceShares | null, given: GivenShares): AppearanceShares | null {
  if (Object.keys(given).length === 0) return null;
  try {
    return withObserverShares(ofMap ?? [0, 0, 0, 0, 0], given);
  } catch {
    return null;
  }
}

/** Only the last question's answer counts. */
let asked = 0;

/** Works the amount out anew, from the last map and what the observer says. */
export async function workOutAmount(): Promise<void> {
  if (!result.value) return;
  const mine = ++asked;
  const engine = await theEngine();
  const shares = ownShares(tally.value?.shares.ofMap ?? null, givenShares.value);
  try {
    const report = await engine.tally({
      setup: withWholeView(setup.value, lensFacts()),
      atLeastCode: atLeastCode.value,
      viewpoint: viewpoint.value,
      polariser: polariser.value,
      ...(shares && { shares }),
    }).promise;
    if (mine !== asked) return;
    tallyFault.value = null;
    tally.value = report;
  } catch (error) {
    if (mine === asked) tallyFault.value = error instanceof Error ? error.message : String(error);
  }
}

let photoOfShares: unknown = null;

/** A new map makes the old amount void; a new photo also what was said of the old one. */
export function keepAmountTrue(): () => void {
  return effect(() => {
    if (image.value !== photoOfShares) {
      photoOfShares = image.value;
      givenShares.value = {};
      atLeastCode.value = 2;
      polariser.value = 'unknown';
    }
    if (!result.value) {
      asked++;
      tally.value = null;
      tallyFault.value = null;
    }
  });
}
