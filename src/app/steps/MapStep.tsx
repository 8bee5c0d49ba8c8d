import { KeepCamera } from '../camera/KeepCamera.tsx';
import { ProbeSheet } from '../reading/ProbeSheet.tsx';
import { image, mapView, onWater, probe, result, setup, wipe } from '../state.ts';
import { shareText } from '../words/numbers.ts';
import { summaryWords } from '../words/reading.ts';

/** Wipe positions that a tap reaches, for those who do not drag. */
const WIPES = [
  ['Map', 0],
  ['Half', 0.5],
  ['Photo', 1],
] as const;

/** The reading: wipe, probe, hand over. */
export function MapStep() {
  const done = result.value;
  const { clean, white } = setup.value.references ?? {};
  const hasReference = Boolean(clean || white);
  if (!done) {
    return (
      <section aria-label="Map">
        <h1>{hasReference ? 'Ready to measure' : 'Measure without a reference?'}</h1>
        <p class="quiet">
          {hasReference
            ? 'The photo’s own film colours will calibrate its camera.'
            : onWater(setup.value.film)
              ? 'Without clean surface or a card the reading is uncalibrated. Marking one takes a tap.'
              : 'The film’s brightest band will have to set the exposure. A marked card is surer, and takes a tap.'}
        </p>
      </section>
    );
  }
  const { summary } = done;
  const { counts } = summary;
  const key = [
    ['i-bare', 'bare surface', counts.bare],
    ['i-unsure', 'order not sure', counts.ambiguous],
    ['i-least', 'too thick for colour', counts.atLeast],
    ['i-none', 'no film colour', counts.noFilmColour],
  ] as const;
  const notices = [...summary.notices.map((n) => n.text), ...(image.value?.opened.notices ?? [])];
  return (
    <section aria-label="Map">
      {probe.value ? (
        <ProbeSheet
          probe={probe.value}
          resolvableToNm={summary.resolvableNm.toNm}
          calibrated={summary.calibrated}
        />
      ) : (
        <>
          <h1>Tap the map to read it</h1>
          <p class={summary.calibrated ? 'badge' : 'badge warn'}>
            {!summary.calibrated
              ? 'Uncalibrated: mark clean surface or a card'
              : hasReference
                ? 'Calibrated by a reference'
                : 'Calibrated by its brightest band only'}
          </p>
          <p>{summaryWords(summary)}</p>
        </>
      )}
      <div class="split">
        <fieldset class="segments" aria-label="What the stage shows">
          {WIPES.map(([name, share]) => (
            <button
              key={name}
              type="button"
              aria-pressed={wipe.value === share}
              onClick={() => (wipe.value = share)}
            >
              {name}
            </button>
          ))}
        </fieldset>
        <button
          type="button"
          class="plain"
          aria-pressed={mapView.value === 'order'}
          onClick={() => (mapView.value = mapView.value === 'order' ? 'thickness' : 'order')}
        >
          Orders
        </button>
      </div>
      <ul class="key" aria-label="Key of the map">
        {key
          .filter(([, , count]) => count > 0)
          .map(([id, name, count]) => (
            <li key={id}>
              <i class={id} />
              <span>
                {name} <span class="quiet">{shareText(count, counts.inRegion)}</span>
              </span>
            </li>
          ))}
      </ul>
      {probe.value && mapView.value === 'thickness' ? (
        <p class="small quiet">
          Curve: dashed by the place’s own colour, filled with its neighbours; the numbers are interference
          orders.
        </p>
      ) : null}
      {summary.fit ? <p class="note small quiet">{summary.fit.advice}</p> : null}
      {done.camera?.determined === 'well' && image.value ? (
        <KeepCamera camera={done.camera} metadata={image.value.opened.metadata} />
      ) : null}
      {notices.map((text) => (
        <p key={text} class="note small warn">
          {text}
        </p>
      ))}
    </section>
  );
}
