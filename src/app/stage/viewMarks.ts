import type { Point, Setup } from '../../engine/setup.ts';

/** One end of the horizon's line or of a known length. */
export interface ViewMark {
  readonly kind: 'horizon' | 'length';
  readonly index: number;
}

export const isViewMark = (mark: { readonly kind: string }): mark is ViewMark =>
  mark.kind === 'horizon' || mark.kind === 'length';

/** The two places of a view mark, or nothing where there are none. */
export function viewEnds({ view }: Setup, kind: ViewMark['kind']): readonly [Point, Point] | undefined {
  return kind === 'horizon' ? view?.horizon : view?.knownLength?.ends;
}

/** The set-up with the places of one kind of view mark replaced. */
export function withViewEnds(setup: Setup, kind: ViewMark['kind'], ends: readonly [Point, Point]): Setup {
  if (kind === 'horizon') return { ...setup, view: { ...setup.view, horizon: ends } };
  const length = setup.view?.knownLength;
  return length ? { ...setup, view: { ...setup.view, knownLength: { ...length, ends } } } : setup;
}

/** The set-up without the mark; both of its ends go. */
export function withoutViewMark(setup: Setup, kind: ViewMark['kind']): Setup {
  const { horizon, knownLength, ...view } = setup.view ?? {};
  return kind === 'horizon'
    ? { ...setup, view: knownLength ? { ...view, knownLength } : view }
    : { ...setup, view: horizon ? { ...view, horizon } : view };
}
