import { useEffect, useState } from 'preact/hooks';
import type { Point } from '../engine/setup.ts';
import { Icon, type IconName } from './parts/Icon.tsx';
import { ThemeButton } from './parts/ThemeButton.tsx';
import { OrderScale, Scale } from './reading/Scale.tsx';
import { cancel, closePhoto, followMarks, measure, readAt } from './session.ts';
import { Stage } from './stage/Stage.tsx';
import { WipeHandle } from './stage/WipeHandle.tsx';
import {
  beginMarking,
  canRedo,
  canUndo,
  failure,
  mapView,
  marking,
  preview,
  probe,
  progress,
  redo,
  result,
  type Step,
  setup,
  step,
  stepsFor,
  undo,
} from './state.ts';
import { AmountStep } from './steps/AmountStep.tsx';
import { FilmStep } from './steps/FilmStep.tsx';
import { LightStep } from './steps/LightStep.tsx';
import { MapStep } from './steps/MapStep.tsx';
import { MarkStep } from './steps/MarkStep.tsx';
import { ViewStep } from './steps/ViewStep.tsx';
import { useMapPicture } from './useMapPicture.ts';
import { firstTap, undoTap } from './viewState.ts';

const STEP_NAMES: Readonly<Record<Step, string>> = {
  film: 'Film',
  light: 'Light',
  mark: 'Mark',
  view: 'View',
  map: 'Map',
  amount: 'Amount',
};

/** Keeps the reading as a record and shows it; the records come lazily. */
const save = () => void import('./records/saveRecord.ts').then(({ saveRecord }) => saveRecord());

/** The photo above, one decision below; the map's scale is the edge between them. */
export function WorkScreen() {
  const [corners, setCorners] = useState<readonly Point[]>([]);
  const measured = result.value;
  const steps = stepsFor(setup.value.film);
  const current = steps.includes(step.value) ? step.value : 'map';
  // Pins are set on the map itself, those of an order on the map of orders.
  const pins = current === 'mark' && (marking.value === 'bare' || marking.value === 'order');
  // The amount goes by thickness, whatever the map step shows.
  const mapShown =
    pins && marking.value === 'order' ? 'order' : current === 'amount' ? 'thickness' : mapView.value;
  const picture = useMapPicture(measured?.map ?? preview.value, mapShown);
  useEffect(followMarks, []);
  const busy = progress.value;

  const go = (next: Step) => {
    step.value = next;
    setCorners([]);
    if (next === 'mark') beginMarking();
    if ((next === 'map' || next === 'amount') && !result.value) void measure();
  };
  const next = steps[steps.indexOf(current) + 1] ?? null;
  const needsMap = (current === 'map' || current === 'amount') && !measured;
  const showsMap = (current === 'map' || current === 'amount' || pins) && picture !== null;

  return (
    <main class="work">
      <Stage
        map={showsMap ? picture.bitmap : null}
        onProbe={(at) => {
          step.value = 'map';
          void readAt(at);
        }}
        corners={corners}
        onCorner={(at) => setCorners([...corners, at])}
      >
        <div class="top">
          <button type="button" class="over" onClick={closePhoto} aria-label="Back to the start">
            <Icon name="back" />
          </button>
          <ThemeButton over />
        </div>
        {showsMap ? <WipeHandle /> : null}
      </Stage>
      <div class="sheet">
        {showsMap ? (
          mapShown === 'order' ? (
            <OrderScale ramp={picture.ramp} orders={picture.orders} />
          ) : (
            <Scale
              ramp={picture.ramp}
              topNm={picture.topNm}
              probe={current === 'amount' ? null : probe.value}
            />
          )
        ) : null}
        {/* A new element for each step, so that each begins at its top. */}
        <div class="content" key={current}>
          {busy ? (
            <section aria-label="Working" aria-live="polite" class="busy">
              <h1>{busy.step}</h1>
              <progress value={busy.share} max={1} aria-label={busy.step} />
            </section>
          ) : (
            <>
              {failure.value ? (
                <p role="alert" class="note warn">
                  {failure.value}
                </p>
              ) : null}
              {current === 'film' ? <FilmStep /> : null}
              {current === 'light' ? <LightStep /> : null}
              {current === 'mark' ? <MarkStep corners={corners} onClear={() => setCorners([])} /> : null}
              {current === 'view' ? <ViewStep /> : null}
              {current === 'map' ? <MapStep /> : null}
              {current === 'amount' ? <AmountStep /> : null}
            </>
          )}
        </div>
        <div class="act">
          <button
            type="button"
            onClick={() => undoTap() || undo()}
            disabled={!(canUndo.value || firstTap.value) || !!busy}
            aria-label="Undo"
          >
            <Icon name="undo" />
          </button>
          <button type="button" onClick={redo} disabled={!canRedo.value || !!busy} aria-label="Redo">
            <Icon name="redo" />
          </button>
          {busy ? (
            <button type="button" class="primary" onClick={cancel}>
              Stop
            </button>
          ) : needsMap ? (
            <button type="button" class="primary" onClick={() => void measure()}>
              Measure
            </button>
          ) : next ? (
            <button type="button" class="primary" onClick={() => go(next)}>
              {next === 'map' && !measured ? 'Measure' : `Next: ${STEP_NAMES[next].toLowerCase()}`}
            </button>
          ) : (
            <button type="button" class="primary" onClick={save}>
              <Icon name="save" />
              Save record
            </button>
          )}
        </div>
        <nav class="steps" aria-label="Steps">
          {steps.map((id) => (
            <button
              key={id}
              type="button"
              aria-current={current === id ? 'step' : undefined}
              onClick={() => go(id)}
            >
              <Icon name={id as IconName} />
              {STEP_NAMES[id]}
            </button>
          ))}
        </nav>
      </div>
    </main>
  );
}
