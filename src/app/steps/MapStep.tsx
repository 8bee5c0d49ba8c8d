import { exportMap, exportRows, exportSummary } from '../handOver.ts';
import { Icon } from '../parts/Icon.tsx';
import { ProbeSheet } from '../reading/ProbeSheet.tsx';
import { measure } from '../session.ts';
import { image, mapView, probe, result, setup, wipe } from '../state.ts';
import { summaryWords } from '../words/reading.ts';

/** The reading: measure, wipe, probe, hand over. */
export function MapStep() {
  const done = result.value;
  if (!done) {
    const references = setup.value.references ?? {};
    const hasReference = Boolean(references.clean || references.white);
    return (
      <section aria-label="Map">
        <h1>{hasReference ? 'Ready to measure' : 'Measure without a reference?'}</h1>
        <p class="quiet">
          {hasReference
            ? 'The photo’s own film colours will calibrate its camera.'
            : 'Without clean surface or a card the reading is uncalibrated. Marking one takes a tap.'}
        </p>
        <button type="button" class="primary" onClick={() => void measure()}>
          <Icon name="map" />
          Measure
        </button>
      </section>
    );
  }
  const { summary } = done;
  return (
    <section aria-label="Map">
      {probe.value ? (
        <ProbeSheet probe={probe.value} resolvableToNm={summary.resolvableNm.toNm} />
      ) : (
        <>
          <h1>{summary.calibrated ? 'Tap the map to read it' : 'Uncalibrated: tap the map to read it'}</h1>
          <p>{summaryWords(summary)}</p>
        </>
      )}
      <label class="field">
        <span class="small quiet">Photo left, map right: slide to compare</span>
        <input
          type="range"
          min="0"
          max="1"
          step="0.01"
          value={wipe.value}
          onInput={(e) => (wipe.value = Number(e.currentTarget.value))}
        />
      </label>
      <div class="row">
        <button
          type="button"
          class="plain"
          onClick={() => (mapView.value = mapView.value === 'order' ? 'thickness' : 'order')}
        >
          {mapView.value === 'order' ? 'Show thickness' : 'Show orders'}
        </button>
        <button type="button" class="plain" onClick={() => (probe.value = null)} disabled={!probe.value}>
          Whole photo
        </button>
      </div>
      <details>
        <summary>Key, fit and notices</summary>
        <ul class="key" aria-label="Key of the map">
          <li>
            <i class="i-bare" />
            bare surface
          </li>
          <li>
            <i class="i-unsure" />
            order not sure
          </li>
          <li>
            <i class="i-least" />
            at least, past colour
          </li>
          <li>
            <i class="i-none" />
            no film colour
          </li>
        </ul>
        {summary.fit ? <p class="note small quiet">{summary.fit.advice}</p> : null}
        {[...summary.notices.map((n) => n.text), ...(image.value?.opened.notices ?? [])].map((text) => (
          <p key={text} class="note small warn">
            {text}
          </p>
        ))}
      </details>
      <details>
        <summary>Hand over</summary>
        <div class="row">
          <button type="button" onClick={() => void exportMap()}>
            <Icon name="save" />
            Map PNG
          </button>
          <button type="button" onClick={exportRows}>
            <Icon name="save" />
            Rows CSV
          </button>
          <button type="button" onClick={exportSummary}>
            <Icon name="save" />
            Summary
          </button>
        </div>
        <p class="small quiet">Indicative only: the responsible authority decides.</p>
      </details>
    </section>
  );
}
