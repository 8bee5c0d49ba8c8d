import { useEffect, useState } from 'preact/hooks';
import type { Point } from '../engine/setup.ts';
import { keepSetup } from './keep.ts';
import { type MapPicture, mapPicture } from './mapPicture.ts';
import { Icon, type IconName } from './parts/Icon.tsx';
import { ThemeButton } from './parts/ThemeButton.tsx';
import { Legend } from './reading/Legend.tsx';
import { cancel, closePhoto, measure, readAt } from './session.ts';
import { Stage } from './stage/Stage.tsx';
import {
  canRedo,
  canUndo,
  failure,
  mapView,
  progress,
  redo,
  result,
  STEPS,
  type Step,
  step,
  undo,
} from './state.ts';
import { FilmStep } from './steps/FilmStep.tsx';
import { LightStep } from './steps/LightStep.tsx';
import { MapStep } from './steps/MapStep.tsx';
import { MarkStep } from './steps/MarkStep.tsx';

const STEP_NAMES: Readonly<Record<Step, string>> = { film: 'Film', light: 'Light', mark: 'Mark', map: 'Map' };
const NEXT: Readonly<Record<Step, Step | null>> = { film: 'light', light: 'mark', mark: 'map', map: null };

/** The photo above, one decision below. */
export function WorkScreen() {
  const [picture, setPicture] = useState<MapPicture | null>(null);
  const [corners, setCorners] = useState<readonly Point[]>([]);
  const measured = result.value;
  const view = mapView.value;

  useEffect(() => {
    let stale = false;
    setPicture(null);
    if (!measured) return;
    void mapPicture(measured.map, view).then((painted) => {
      if (stale) painted.bitmap.close();
      else setPicture(painted);
    });
    return () => {
      stale = true;
    };
  }, [measured, view]);

  const go = (next: Step) => {
    step.value = next;
    keepSetup();
    if (next === 'map' && !result.value) void measure();
  };
  const current = step.value;
  const next = NEXT[current];
  const busy = progress.value;

  return (
    <main class="work">
      <Stage
        map={current === 'map' ? (picture?.bitmap ?? null) : null}
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
          <div class="bar">
            <button type="button" class="over" onClick={undo} disabled={!canUndo.value} aria-label="Undo">
              <Icon name="undo" />
            </button>
            <button type="button" class="over" onClick={redo} disabled={!canRedo.value} aria-label="Redo">
              <Icon name="redo" />
            </button>
            <ThemeButton over />
          </div>
        </div>
        {picture && current === 'map' && view === 'thickness' ? (
          <Legend ramp={picture.ramp} topNm={picture.topNm} />
        ) : null}
      </Stage>
      <div class="sheet">
        <div class="content">
          {busy ? (
            <section aria-label="Working" aria-live="polite">
              <h1>{busy.step}</h1>
              <progress value={busy.share} max={1} aria-label={busy.step} />
              <button type="button" onClick={cancel}>
                Stop
              </button>
            </section>
          ) : (
            <>
              {failure.value ? (
                <p role="alert" class="warn">
                  {failure.value}
                </p>
              ) : null}
              {current === 'film' ? <FilmStep /> : null}
              {current === 'light' ? <LightStep /> : null}
              {current === 'mark' ? <MarkStep corners={corners} onClear={() => setCorners([])} /> : null}
              {current === 'map' ? <MapStep /> : null}
            </>
          )}
        </div>
        {next && !busy ? (
          <button type="button" class="primary" onClick={() => go(next)}>
            {next === 'map' ? 'Measure' : `Next: ${STEP_NAMES[next].toLowerCase()}`}
          </button>
        ) : null}
        <nav class="steps" aria-label="Steps">
          {STEPS.map((id) => (
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
