import { useState } from 'preact/hooks';
import { scaleFromLength } from '../../view/groundScale.ts';
import { NumberEntry } from '../parts/NumberEntry.tsx';
import { selected, setup } from '../state.ts';
import { changeView, firstTap, lengthEnds, sketch, viewTarget } from '../viewState.ts';
import { LENGTHS, roundStep } from '../words/entryUnits.ts';
import { NudgePad } from './NudgePad.tsx';

/** A boom section, a hull or a quay edge of known length: a check of the rest, or the source of the height. */
export function KnownLength() {
  const known = setup.value.view?.knownLength;
  const [open, setOpen] = useState(known !== undefined);
  const ends = known?.ends ?? lengthEnds.value;
  const aim = (next: boolean) => {
    setOpen(next);
    viewTarget.value = next ? 'length' : 'horizon';
    firstTap.value = null;
    selected.value = null;
    if (!next) lengthEnds.value = null;
  };
  if (!open) {
    return (
      <button type="button" class="plain" onClick={() => aim(true)}>
        Check with a known length
      </button>
    );
  }
  return (
    <>
      <h2>Known length on the water</h2>
      {ends ? (
        <NumberEntry
          label="Length between the taps"
          value={known?.lengthM ?? null}
          units={LENGTHS}
          low={1e-3}
          high={1e5}
          start={10}
          stepOf={roundStep}
          onChange={(value, series) => {
            if (value === null) {
              lengthEnds.value = ends;
              return changeView({ knownLength: undefined }, series);
            }
            changeView({ knownLength: { ...known, ends, lengthM: value } }, series);
          }}
        />
      ) : (
        <p class="quiet">Tap both ends on the photo, at the waterline.</p>
      )}
      {selected.value?.kind === 'length' ? <NudgePad /> : null}
      <Disagreement />
      <div class="row">
        {viewTarget.value === 'horizon' ? (
          <button type="button" class="plain" onClick={() => aim(true)}>
            Move its ends
          </button>
        ) : (
          <button type="button" class="plain" onClick={() => aim(false)}>
            Done
          </button>
        )}
        {known ? (
          <button
            type="button"
            class="plain"
            onClick={() => {
              changeView({ knownLength: undefined });
              aim(false);
            }}
          >
            Remove it
          </button>
        ) : null}
      </div>
    </>
  );
}

/** The length beside what the view makes of it. */
function Disagreement() {
  const known = setup.value.view?.knownLength;
  const { seen } = sketch.value;
  if (!known || !seen || known.sets) return null;
  try {
    const check = scaleFromLength(seen.view, known.ends[0], known.ends[1], known.lengthM);
    const off = Math.round(100 * check.disagreement);
    return (
      <>
        {seen.hasScale ? (
          <p class={check.notice ? 'warn' : 'quiet'}>
            {check.notice?.text ??
              `The view makes it ${check.measuredM.toPrecision(3)} m, ${off === 0 ? 'the same' : `${Math.abs(off)} % ${off > 0 ? 'more' : 'less'}`}.`}
          </p>
        ) : null}
        <button type="button" onClick={() => changeView({ knownLength: { ...known, sets: true } })}>
          Use it for the height: {check.impliedHeightM.toPrecision(3)} m
        </button>
      </>
    );
  } catch (error) {
    return (
      <p role="alert" class="warn">
        {error instanceof Error ? error.message : String(error)}
      </p>
    );
  }
}
