import { useEffect } from 'preact/hooks';
import { keepHeightM, keptHeightM } from '../keepHeight.ts';
import { NumberEntry } from '../parts/NumberEntry.tsx';
import { selected, setup } from '../state.ts';
import {
  beginView,
  changeView,
  chooseViewMode,
  firstTap,
  lensFacts,
  missingView,
  sketch,
  type ViewMode,
  viewMode,
  viewTarget,
} from '../viewState.ts';
import { LENGTHS, MILLIMETRES, roundStep, SMALL_LENGTHS } from '../words/entryUnits.ts';
import { KnownLength } from './KnownLength.tsx';
import { NudgePad } from './NudgePad.tsx';
import { SunNote } from './SunNote.tsx';
import { TiltEntry } from './TiltEntry.tsx';
import { WindEntry } from './WindEntry.tsx';

const MODES: readonly (readonly [ViewMode, string])[] = [
  ['horizon', 'Horizon'],
  ['tilt', 'Tilt'],
  ['down', 'From above'],
];

export const MISSING_WORDS = {
  height: 'the height of the lens',
  focal: 'the focal length',
  tilt: 'the horizon or the tilt',
} as const;

/** A first height for − and +: a person on a low quay. */
const START_M = 3;

/** Where the camera stood: height, horizon or tilt, lens; and what blurs the colours, the wind. */
export function ViewStep() {
  useEffect(beginView, []);
  const mode = viewMode.value;
  const view = setup.value.view ?? {};
  const missing = missingView.value;
  const { fault } = sketch.value;
  return (
    <section aria-label="View">
      <h1>{title()}</h1>
      <fieldset class="segments words" aria-label="How the tilt of the camera is told">
        {MODES.map(([id, name]) => (
          <button key={id} type="button" aria-pressed={mode === id} onClick={() => chooseViewMode(id)}>
            {name}
          </button>
        ))}
      </fieldset>
      {mode === 'down' ? <DownEntry /> : <HeightEntry />}
      {selected.value && view.horizon && viewTarget.value === 'horizon' ? <NudgePad /> : null}
      {mode === 'tilt' ? <TiltEntry /> : null}
      {fault ? (
        <p role="alert" class="note warn">
          {fault}
        </p>
      ) : null}
      {mode === 'horizon' && !view.horizon && !firstTap.value ? (
        <p class="quiet">The edge of the sea, or the waterline of a far shore: once left, once right.</p>
      ) : null}
      <p class="small quiet">
        {missing.length === 0
          ? mode === 'down'
            ? 'Check the bar on the photo: is it as long as it says?'
            : 'Check the lines on the photo: do horizon and distances look right?'
          : `Still open: ${missing.map((id) => MISSING_WORDS[id]).join(', ')}. Without it the amount is given in shares only, not in litres.`}
      </p>
      <LensEntry focal35mm={view.focal35mm} />
      <SunNote />
      <WindEntry />
      <KnownLength />
    </section>
  );
}

function title(): string {
  if (viewTarget.value === 'length')
    return firstTap.value ? 'Now its other end' : 'Tap both ends of the length';
  if (viewMode.value === 'down') return 'How far above the water?';
  if (viewMode.value === 'tilt') return 'How was the camera held?';
  if (firstTap.value) return 'Now the other side';
  return setup.value.view?.horizon ? 'Where the camera stood' : 'Tap the horizon twice';
}

function HeightEntry() {
  const heightM = setup.value.view?.heightM ?? null;
  const known = setup.value.view?.knownLength;
  const last = keptHeightM();
  if (known?.sets) {
    return (
      <p class="split">
        <span>Height from the known length: {sketch.value.seen?.view.heightM.toPrecision(3) ?? '–'} m</span>
        <button
          type="button"
          class="plain"
          onClick={() => changeView({ knownLength: { ends: known.ends, lengthM: known.lengthM } })}
        >
          Type it instead
        </button>
      </p>
    );
  }
  return (
    <>
      <NumberEntry
        label="Lens above the water"
        value={heightM}
        units={LENGTHS}
        low={0.05}
        high={20_000}
        start={START_M}
        stepOf={roundStep}
        onChange={(value, series) => {
          if (value !== null) keepHeightM(value);
          changeView({ heightM: value ?? undefined }, series);
        }}
      />
      {heightM === null && last !== null ? (
        <button type="button" class="plain" onClick={() => changeView({ heightM: last })}>
          {Number(last.toPrecision(3))} m, as last time
        </button>
      ) : null}
    </>
  );
}

/** Straight down: the height, or the size of a pixel where that is what a drone's log or a scale in the photo tells. */
function DownEntry() {
  const { heightM, pixelSizeM } = setup.value.view ?? {};
  return (
    <>
      {pixelSizeM === undefined ? <HeightEntry /> : null}
      {heightM === undefined ? (
        <NumberEntry
          label={pixelSizeM === undefined ? 'or one pixel on the water' : 'One pixel on the water'}
          value={pixelSizeM ?? null}
          units={SMALL_LENGTHS}
          low={1e-6}
          high={1000}
          start={1}
          stepOf={roundStep}
          onChange={(value, series) => changeView({ pixelSizeM: value ?? undefined }, series)}
        />
      ) : null}
    </>
  );
}

function LensEntry({ focal35mm }: { readonly focal35mm: number | undefined }) {
  const own = lensFacts().focalLength35mm;
  if (own !== undefined && focal35mm === undefined) {
    return (
      <details class="small">
        <summary class="split">
          <span>Lens {own} mm, from the photo</span>
          <span class="change">Change</span>
        </summary>
        <FocalEntry value={own} />
      </details>
    );
  }
  return <FocalEntry value={focal35mm ?? null} />;
}

function FocalEntry({ value }: { readonly value: number | null }) {
  return (
    <>
      <NumberEntry
        label="Focal length, as on 35 mm film"
        value={value}
        units={MILLIMETRES}
        low={5}
        high={2000}
        start={26}
        stepOf={() => 1}
        onChange={(next, series) => changeView({ focal35mm: next ?? undefined }, series)}
      />
      <p class="small quiet">The main camera of most phones has 24 to 28 mm. A cropped photo has more.</p>
    </>
  );
}
