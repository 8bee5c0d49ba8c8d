import { useState } from 'preact/hooks';
import { FILM_PRESETS } from '../../engine/setup.ts';
import { change, image, onWater, setup } from '../state.ts';
import { FILM_NAMES } from '../words/names.ts';
import { OwnFilm } from './OwnFilm.tsx';

/** What the film is made of. */
export function FilmStep() {
  const { film } = setup.value;
  const [own, setOwn] = useState(typeof film !== 'string');
  const { trend, ...untrended } = setup.value;
  const notices = image.value?.opened.notices ?? [];
  return (
    <section aria-label="Film">
      <h1>What is the film?</h1>
      <div class="choices">
        {FILM_PRESETS.map((preset) => (
          <button
            key={preset}
            type="button"
            aria-pressed={film === preset && !own}
            onClick={() => {
              setOwn(false);
              change({ ...setup.value, film: preset });
            }}
          >
            {FILM_NAMES[preset]}
          </button>
        ))}
        <button type="button" aria-pressed={own} onClick={() => setOwn(true)}>
          My own film
        </button>
      </div>
      {own ? <OwnFilm /> : null}
      {onWater(film) ? null : (
        <label class="check">
          <input
            type="checkbox"
            checked={trend === 'thickerDown'}
            onChange={(e) =>
              change(e.currentTarget.checked ? { ...untrended, trend: 'thickerDown' } : untrended)
            }
          />
          It hangs and drains: thicker towards the bottom
        </label>
      )}
      {onWater(film) ? (
        <p class="note small warn">
          Stay upwind and out of the vapour, keep your footing, touch nothing. Report first: a sheen is
          reportable whatever its thickness.
        </p>
      ) : null}
      {notices.map((text) => (
        <p key={text} class="note small quiet">
          {text}
        </p>
      ))}
    </section>
  );
}
