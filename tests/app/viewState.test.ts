import { beforeEach, describe, expect, it } from 'vitest';
import { gripAt, movedMark, withoutMark } from '../../src/app/stage/grips.ts';
import { begin, redo, setup, stepsFor, undo } from '../../src/app/state.ts';
import {
  beginView,
  changeView,
  chooseViewMode,
  firstTap,
  lengthEnds,
  missingView,
  sketch,
  tapView,
  viewMode,
  viewTarget,
} from '../../src/app/viewState.ts';
import type { Setup } from '../../src/engine/setup.ts';

const DIESEL: Setup = { film: 'diesel' };

beforeEach(() => {
  begin(DIESEL);
  beginView();
});

describe('where the camera stood', () => {
  it('is asked of films on water only', () => {
    expect(stepsFor('diesel')).toContain('view');
    expect(stepsFor('soap')).not.toContain('view');
  });

  it('takes two taps on the horizon, left one first whichever came first', () => {
    tapView([900, 110]);
    expect(firstTap.value).toEqual([900, 110]);
    expect(setup.value.view).toBeUndefined();
    tapView([100, 120]);
    expect(firstTap.value).toBeNull();
    expect(setup.value.view?.horizon).toEqual([
      [100, 120],
      [900, 110],
    ]);
  });

  it('moves the nearer end with a third tap, and undoes it', () => {
    changeView({
      horizon: [
        [100, 120],
        [900, 110],
      ],
    });
    tapView([850, 90]);
    expect(setup.value.view?.horizon).toEqual([
      [100, 120],
      [850, 90],
    ]);
    undo();
    expect(setup.value.view?.horizon?.[1]).toEqual([900, 110]);
    redo();
    expect(setup.value.view?.horizon?.[1]).toEqual([850, 90]);
  });

  it('puts away what another way of telling the tilt said, keeps the height, and brings the horizon back', () => {
    const horizon = [
      [100, 120],
      [900, 110],
    ] as const;
    changeView({
      heightM: 3,
      horizon,
    });
    chooseViewMode('tilt');
    expect(setup.value.view).toEqual({ heightM: 3 });
    changeView({ pitchDeg: -30 });
    chooseViewMode('down');
    expect(setup.value.view).toEqual({ heightM: 3, pitchDeg: -90 });
    expect(viewMode.value).toBe('down');
    chooseViewMode('horizon');
    expect(setup.value.view).toEqual({ heightM: 3, horizon });
  });

  it('comes back with an undo, and the way of telling with it', () => {
    changeView({
      horizon: [
        [100, 120],
        [900, 110],
      ],
    });
    chooseViewMode('tilt');
    changeView({ pitchDeg: -30 });
    undo();
    undo();
    expect(viewMode.value).toBe('horizon');
    expect(setup.value.view?.horizon).toBeDefined();
  });

  it('has no view left when the last thing said is taken away', () => {
    changeView({ heightM: 3 });
    changeView({ heightM: undefined });
    expect('view' in setup.value).toBe(false);
  });

  it('keeps the ends of a length until its metres are typed', () => {
    viewTarget.value = 'length';
    tapView([10, 20]);
    tapView([30, 40]);
    expect(lengthEnds.value).toEqual([
      [10, 20],
      [30, 40],
    ]);
    expect(setup.value.view).toBeUndefined();
  });

  it('says what is still open, and draws angles before the height is known', () => {
    changeView({ focal35mm: 26 });
    expect(missingView.value).toEqual(['height', 'tilt']);
    changeView({ pitchDeg: -30 });
    expect(missingView.value).toEqual(['height']);
    expect(sketch.value.seen?.hasScale).toBe(false);
    changeView({ heightM: 3 });
    expect(sketch.value.seen?.hasScale).toBe(true);
  });

  it('turns two taps that are too close into a sentence', () => {
    changeView({
      focal35mm: 26,
      horizon: [
        [0, 0],
        [0, 0],
      ],
    });
    expect(sketch.value.seen).toBeNull();
    expect(sketch.value.fault).toMatch(/too close together/);
  });
});

describe('the ends of the horizon as marks', () => {
  const marked: Setup = {
    film: 'diesel',
    view: {
      heightM: 3,
      horizon: [
        [100, 120],
        [900, 110],
      ],
    },
  };
  const photo = { width: 1000, height: 800 };

  it('are taken hold of, moved one at a time, and removed together', () => {
    const grip = gripAt({ scale: 1, x: 0, y: 0 }, marked, null, 905, 100);
    expect(grip).toEqual({ mark: { kind: 'horizon', index: 1 }, corner: null });
    if (!grip) return;
    expect(movedMark(marked, grip, -5, 10, photo).view?.horizon).toEqual([
      [100, 120],
      [895, 120],
    ]);
    expect(withoutMark(marked, grip.mark).view).toEqual({ heightM: 3 });
  });
});
