import type { Observation, ViewpointKind } from '../../record/observation.ts';

const KEY = 'tintfathom.observer';

export interface RememberedObserver {
  readonly observer: Observation['observer'];
  readonly from: ViewpointKind;
}

/** What the observer said of themselves last time, so that it need not be typed on the quay. */
export function rememberedObserver(): RememberedObserver | null {
  try {
    const text = localStorage.getItem(KEY);
    return text ? (JSON.parse(text) as RememberedObserver) : null;
  } catch {
    return null;
  }
}

/** Remembers who observes and from where; not the incident, which is another one next time. */
export function rememberObserver({ observer, viewpoint }: Observation): void {
  const { incident: _, ...who } = observer;
  try {
    localStorage.setItem(KEY, JSON.stringify({ observer: who, from: viewpoint.from }));
  } catch {
    // Only a convenience is lost.
  }
}
