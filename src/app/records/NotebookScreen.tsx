import { useState } from 'preact/hooks';
import { areaFigures, codeVolumeFigures, plural } from '../../record/inWords.ts';
import type { ViewpointKind } from '../../record/observation.ts';
import { APPEARANCE_CODE_SCOPE, APPEARANCES } from '../../tally/appearanceCode.ts';
import { AREA_UNITS, inUnit, LENGTH_UNITS } from '../../tally/units.ts';
import { Icon } from '../parts/Icon.tsx';
import { attempt, shown, theDesk } from './desk.ts';
import { ChoiceField, NumberField } from './fields/Inputs.tsx';
import { type LengthUnitId, type Notes, notebookObservation, reckon } from './notebook.ts';
import { rememberedObserver, rememberObserver } from './observerMemory.ts';
import { ScreenBar } from './ScreenBar.tsx';
import { MADE_WITH } from './saveRecord.ts';

const UNITS = Object.values(LENGTH_UNITS).map(
  ({ id, name }) => [id as LengthUnitId, plural(name, 2)] as const,
);

const FROM: readonly (readonly [ViewpointKind, string])[] = [
  ['aircraft', 'Aircraft'],
  ['drone', 'Drone'],
  ['vessel', 'Vessel'],
  ['shore', 'Shore, quay, bank'],
];

const empty = (): Notes => {
  const from = rememberedObserver()?.from;
  return {
    length: undefined,
    width: undefined,
    unit: 'm',
    coveragePercent: undefined,
    sharesPercent: APPEARANCES.map(() => undefined),
    windMS: undefined,
    from: from && from !== 'bench' ? from : 'unknown',
  };
};

/** What an observer with a notebook has: a box round the slick, how much is oiled, what the oil looks like. */
export function NotebookScreen() {
  const [notes, setNotes] = useState<Notes>(empty);
  const change = (patch: Partial<Notes>) => setNotes((before) => ({ ...before, ...patch }));
  const { volume, missing, notices } = reckon(notes);
  const setShare = (index: number, percent: number | undefined) =>
    setNotes((before) => ({
      ...before,
      sharesPercent: before.sharesPercent.map((old, i) => (i === index ? percent : old)),
    }));
  const save = () =>
    void attempt('saving the record', async () => {
      const remembered = rememberedObserver();
      const observation = notebookObservation(notes, {
        id: crypto.randomUUID(),
        nowUtc: new Date().toISOString(),
        madeWith: MADE_WITH,
        ...(remembered && { observer: remembered.observer }),
      });
      rememberObserver(observation);
      shown.value = await theDesk().keep({ observation, original: null, thumbnail: null, map: null });
      location.hash = `#/records/${observation.id}`;
    });
  return (
    <main class="page records">
      <ScreenBar title="Without a photo" back="All records" to="#/records" />
      <p class="quiet small">
        A box round the slick, the oiled part of it, and what the oil looks like. Your other duties come
        first.
      </p>
      <ChoiceField
        label="Seen from"
        value={notes.from === 'unknown' ? undefined : notes.from}
        choices={FROM}
        none="not said"
        onValue={(from) => change({ from: from ?? 'unknown' })}
      />
      <ChoiceField
        label="Lengths are in"
        value={notes.unit}
        choices={UNITS}
        none={null}
        onValue={(unit) => change({ unit: unit ?? 'm' })}
      />
      <div class="pair">
        <NumberField
          label="Length"
          value={notes.length}
          least={0}
          most={10_000_000}
          onValue={(length) => change({ length })}
        />
        <NumberField
          label="Width"
          value={notes.width}
          least={0}
          most={10_000_000}
          onValue={(width) => change({ width })}
        />
        <NumberField
          label="Coverage, %"
          value={notes.coveragePercent}
          least={0}
          most={100}
          onValue={(coveragePercent) => change({ coveragePercent })}
        />
        <NumberField
          label="Wind, m/s"
          value={notes.windMS}
          least={0}
          most={80}
          onValue={(windMS) => change({ windMS })}
        />
      </div>
      <Shares sharesPercent={notes.sharesPercent} onShare={setShare} />
      <section aria-label="Result" aria-live="polite">
        {volume ? <Result volume={volume} /> : <p class="quiet">{missing}</p>}
        {notices.map(({ code, text }) => (
          <p key={code} class="note warn small">
            {text}
          </p>
        ))}
        {volume && notes.from !== 'aircraft' ? <p class="small quiet">{APPEARANCE_CODE_SCOPE}</p> : null}
      </section>
      <div class="low dock">
        <button type="button" class="primary" onClick={save}>
          <Icon name="save" />
          Save record
        </button>
      </div>
    </main>
  );
}

/** Percent of the oil in each appearance, with the rest a tap away. */
function Shares({
  sharesPercent,
  onShare,
}: {
  readonly sharesPercent: readonly (number | undefined)[];
  readonly onShare: (index: number, percent: number | undefined) => void;
}) {
  const sum = sharesPercent.reduce<number>((total, percent) => total + (percent ?? 0), 0);
  const rest = Math.round(10 * (100 - sum)) / 10;
  return (
    <fieldset class="shares">
      <legend>Appearance of the oil, % of it</legend>
      {APPEARANCES.map(({ code, name, minUm, maxUm, openEnded }, i) => (
        <div key={code} class="share">
          <NumberField
            label={`${code} ${name}, ${openEnded ? `over ${minUm}` : `${minUm} to ${maxUm}`} µm`}
            value={sharesPercent[i]}
            least={0}
            most={100}
            onValue={(percent) => onShare(i, percent)}
          />
          <button
            type="button"
            class="plain"
            disabled={rest <= 0}
            aria-label={`The rest is ${name}`}
            onClick={() => onShare(i, Math.round(10 * ((sharesPercent[i] ?? 0) + rest)) / 10)}
          >
            Rest
          </button>
        </div>
      ))}
    </fieldset>
  );
}

function Result({ volume }: { readonly volume: NonNullable<ReturnType<typeof reckon>['volume']> }) {
  const { oiledM2, minM3, maxM3, atLeast } = volume;
  const area = areaFigures({ least: oiledM2, best: oiledM2, most: oiledM2 });
  const { least, most, unit } = codeVolumeFigures(minM3, maxM3);
  const inNautical = inUnit(oiledM2, AREA_UNITS.nauticalSquareMile);
  return (
    <dl class="figures">
      <div>
        <dt>Oiled area</dt>
        <dd>
          {area.best} {plural(area.unit.name, area.best)}
          {inNautical >= 0.01 ? (
            <small class="quiet">
              {inNautical.toPrecision(2)} {plural(AREA_UNITS.nauticalSquareMile.name, 2)}
            </small>
          ) : null}
        </dd>
      </div>
      <div>
        <dt>Volume by appearance code</dt>
        <dd>
          {atLeast ? 'at least ' : ''}
          {maxM3 > 0 ? `${least} to ${most} ${plural(unit.name, most)}` : 'none'}
          <small class="quiet">least to most; the code gives no best</small>
        </dd>
      </div>
    </dl>
  );
}
