import type { Setup } from './setup.ts';

/**
 * What a change of the set-up costs, cheapest first: nothing (the map stays true), only the order step, which pixels
 * take part, or everything from the camera fit on.
 */
export type SetupChange = 'none' | 'orders' | 'mask' | 'all';

const COSTS: Readonly<Partial<Record<keyof Setup, SetupChange>>> = {
  // Said on the record, unheard by the reading.
  position: 'none',
  headingDeg: 'none',
  pins: 'orders',
  trend: 'orders',
  // The camera is fitted to the pixels that take part, so a final map starts anew; a preview keeps the fit.
  region: 'mask',
  strokes: 'mask',
};
const RANKS: readonly SetupChange[] = ['none', 'orders', 'mask', 'all'];

/** Nothing said and an empty list are the same to the reading. */
function said(value: unknown): string | undefined {
  return Array.isArray(value) && value.length === 0 ? undefined : JSON.stringify(value);
}

/** How much of a map made with `before` has to be made anew for `after`. */
export function changeBetween(before: Setup, after: Setup): SetupChange {
  const keys = new Set([...Object.keys(before), ...Object.keys(after)] as (keyof Setup)[]);
  let worst = 0;
  for (const key of keys) {
    if (before[key] === after[key] || said(before[key]) === said(after[key])) continue;
    worst = Math.max(worst, RANKS.indexOf(COSTS[key] ?? 'all'));
  }
  return RANKS[worst] ?? 'all';
}
