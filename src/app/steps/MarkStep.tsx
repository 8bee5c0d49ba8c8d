import type { Point, Setup } from '../../engine/setup.ts';
import { Icon } from '../parts/Icon.tsx';
import {
  change,
  chooseMarking,
  type MarkKind,
  marking,
  pinOrder,
  selected,
  setRegion,
  setup,
} from '../state.ts';
import { BrushPad } from './BrushPad.tsx';
import { CardLevel } from './CardLevel.tsx';
import { NudgePad } from './NudgePad.tsx';

const KINDS: readonly (readonly [MarkKind, string, string])[] = [
  ['clean', 'Clean surface', 'Tap bare surface right beside the film. It is thickness 0.'],
  ['white', 'Grey card', 'Tap a grey card in the same light. White cards are easily too bright.'],
  ['dark', 'Dark', 'Tap black film or deep shadow. It shows stray light.'],
  ['region', 'Region', 'Tap the corners of the part to look at, then close it.'],
  ['out', 'Paint out', 'Glint, foam, hull, shadow. Two fingers move the photo.'],
  ['in', 'Paint in', 'If you paint in first, only that is measured. Two fingers move the photo.'],
  ['bare', 'Pin: bare', 'Tap where you know that there is no film.'],
  ['order', 'Pin: order', 'Tap where you know the interference order.'],
];

const TITLES: Readonly<Record<MarkKind, string>> = {
  clean: 'Mark clean surface',
  white: 'Mark a grey card',
  dark: 'Mark something dark',
  region: 'Mark the region',
  out: 'Paint out what is no film',
  in: 'Paint in what to measure',
  bare: 'Pin bare surface',
  order: 'Pin an order',
};

function isMarked(kind: MarkKind, { references, region, pins, strokes }: Setup): boolean {
  if (kind === 'region') return region !== undefined;
  if (kind === 'out' || kind === 'in') return strokes?.some(({ paint }) => paint === kind) ?? false;
  if (kind === 'bare') return pins?.some((pin) => pin.is === 'bare') ?? false;
  if (kind === 'order') return pins?.some((pin) => pin.order !== undefined) ?? false;
  return references?.[kind] !== undefined;
}

/** References, region, brush and pins. */
export function MarkStep({
  corners,
  onClear,
}: {
  readonly corners: readonly Point[];
  readonly onClear: () => void;
}) {
  const kind = marking.value;
  const { references: _r, pins: _p, region: _g, strokes: _s, ...unmarked } = setup.value;
  const hasMarks = KINDS.some(([id]) => isMarked(id, setup.value));
  return (
    <section aria-label="Mark">
      <h1>{selected.value ? 'Drag it, or tap the arrows' : TITLES[kind]}</h1>
      <fieldset class="kinds" aria-label="What to mark">
        {KINDS.map(([id, name]) => (
          <button key={id} type="button" aria-pressed={kind === id} onClick={() => chooseMarking(id)}>
            {isMarked(id, setup.value) ? <Icon name="tick" /> : null}
            {name}
          </button>
        ))}
      </fieldset>
      {kind === 'out' || kind === 'in' ? <BrushPad /> : null}
      {selected.value ? <NudgePad /> : <p class="quiet">{KINDS.find(([id]) => id === kind)?.[2]}</p>}
      <div class="row">
        {kind === 'region' && corners.length >= 3 ? (
          <button
            type="button"
            class="primary"
            onClick={() => {
              setRegion(corners);
              onClear();
            }}
          >
            Close the region
          </button>
        ) : null}
        {kind === 'region' && (setup.value.region || corners.length > 0) ? (
          <button
            type="button"
            class="plain"
            onClick={() => {
              onClear();
              if (setup.value.region) setRegion(null);
            }}
          >
            Look at the whole photo
          </button>
        ) : null}
      </div>
      {kind === 'white' ? <CardLevel /> : null}
      {kind === 'order' ? (
        <label class="field">
          Order of the next pin
          <select value={pinOrder.value} onChange={(e) => (pinOrder.value = Number(e.currentTarget.value))}>
            {[1, 2, 3, 4, 5, 6].map((n) => (
              <option key={n} value={n}>
                {n}
              </option>
            ))}
          </select>
        </label>
      ) : null}
      {kind === 'bare' || kind === 'order' ? (
        <label class="check">
          <input
            type="checkbox"
            checked={setup.value.trend === 'thickerDown'}
            onChange={(e) => {
              const { trend: _, ...rest } = setup.value;
              change(e.currentTarget.checked ? { ...rest, trend: 'thickerDown' } : rest);
            }}
          />
          Draining film: thicker downwards
        </label>
      ) : null}
      {hasMarks ? (
        <button type="button" class="plain" onClick={() => change(unmarked)}>
          Clear all marks
        </button>
      ) : null}
    </section>
  );
}
