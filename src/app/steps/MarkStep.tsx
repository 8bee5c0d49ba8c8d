import type { Point } from '../../engine/setup.ts';
import { changeAndKeep } from '../session.ts';
import { closeRegion } from '../stage/Stage.tsx';
import { type MarkKind, marking, onWater, pinOrder, setReference, setRegion, setup } from '../state.ts';

const KINDS: readonly (readonly [MarkKind, string, string])[] = [
  ['clean', 'Clean surface', 'Tap or drag over bare surface right beside the film: it is thickness 0.'],
  [
    'white',
    'Grey card',
    'Tap or drag over a grey card in the same light. White cards are easily too bright.',
  ],
  ['dark', 'Dark', 'Tap or drag over black film or deep shadow: it shows stray light.'],
  ['region', 'Region', 'Tap the corners of the part to look at, then close it.'],
  ['bare', 'Pin: bare', 'Tap where you know that there is no film.'],
  ['order', 'Pin: order', 'Tap where you know the interference order.'],
];

/** References, region and pins. */
export function MarkStep({
  corners,
  onClear,
}: {
  readonly corners: readonly Point[];
  readonly onClear: () => void;
}) {
  const kind = marking.value;
  const references = setup.value.references ?? {};
  const marked = kind === 'clean' || kind === 'white' || kind === 'dark' ? references[kind] : undefined;
  const { references: _r, pins: _p, region: _g, ...bare } = setup.value;
  return (
    <section aria-label="Mark">
      <h1>{onWater(setup.value.film) ? 'Mark clean water' : 'Mark a reference'}</h1>
      <div class="choices">
        {KINDS.map(([id, name]) => (
          <button key={id} type="button" aria-pressed={kind === id} onClick={() => (marking.value = id)}>
            {name}
          </button>
        ))}
      </div>
      <p class="quiet">{KINDS.find(([id]) => id === kind)?.[2]}</p>
      <div class="row">
        {marked && (kind === 'clean' || kind === 'white' || kind === 'dark') ? (
          <button type="button" class="plain" onClick={() => setReference(kind, null)}>
            Remove this mark
          </button>
        ) : null}
        {kind === 'region' && corners.length >= 3 ? (
          <button
            type="button"
            class="primary"
            onClick={() => {
              closeRegion(corners);
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
              setRegion(null);
            }}
          >
            Look at the whole photo
          </button>
        ) : null}
        {setup.value.pins?.length || setup.value.region || setup.value.references ? (
          <button type="button" class="plain" onClick={() => changeAndKeep(bare)}>
            Clear all marks
          </button>
        ) : null}
      </div>
      {kind === 'white' ? <CardLevel /> : null}
      {kind === 'order' ? (
        <label class="field">
          Order
          <select value={pinOrder.value} onChange={(e) => (pinOrder.value = Number(e.currentTarget.value))}>
            {[1, 2, 3, 4, 5, 6].map((n) => (
              <option key={n} value={n}>
                {n}
              </option>
            ))}
          </select>
        </label>
      ) : null}
    </section>
  );
}

function CardLevel() {
  const references = setup.value.references ?? {};
  return (
    <label class="field">
      Reflectance of the card, %, if it is stated on it
      <input
        class="entry"
        type="number"
        inputMode="decimal"
        min="0.5"
        max="100"
        step="0.5"
        value={references.whiteReflectance === undefined ? '' : references.whiteReflectance * 100}
        onChange={(e) => {
          const percent = Number(e.currentTarget.value);
          const { whiteReflectance: _, ...others } = references;
          const valid = percent >= 0.5 && percent <= 100;
          changeAndKeep({
            ...setup.value,
            references: valid ? { ...others, whiteReflectance: percent / 100 } : others,
          });
        }}
      />
    </label>
  );
}
