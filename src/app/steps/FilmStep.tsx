import { useState } from 'preact/hooks';
import { FILM_PRESETS } from '../../engine/setup.ts';
import { changeAndKeep } from '../session.ts';
import { onWater, setup } from '../state.ts';
import { FILM_NAMES } from '../words/names.ts';

/** What the film is made of. */
export function FilmStep() {
  const { film } = setup.value;
  const [own, setOwn] = useState(typeof film !== 'string');
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
              changeAndKeep({ ...setup.value, film: preset });
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
      {onWater(film) ? (
        <p class="note small warn">
          Stay upwind and out of the vapour, keep your footing, touch nothing. Report first: a sheen is
          reportable whatever its thickness.
        </p>
      ) : null}
    </section>
  );
}

function OwnFilm() {
  const [nD, setND] = useState('1.40');
  const [abbe, setAbbe] = useState('55');
  const [under, setUnder] = useState('air');
  const apply = () => {
    const index = Number(nD);
    const dispersion = Number(abbe);
    if (!(index >= 1 && index <= 5) || !(dispersion >= 5 && dispersion <= 200)) return;
    changeAndKeep({
      ...setup.value,
      film: {
        ambient: 'air',
        layers: [{ material: { nD: index, abbe: dispersion, spread: 0.005 } }],
        substrate: under,
      },
    });
  };
  return (
    <div class="row">
      <label class="field">
        Index n_D
        <input
          class="entry"
          type="number"
          inputMode="decimal"
          step="0.001"
          min="1"
          max="5"
          value={nD}
          onInput={(e) => setND(e.currentTarget.value)}
        />
      </label>
      <label class="field">
        Abbe number
        <input
          class="entry"
          type="number"
          inputMode="decimal"
          min="5"
          max="200"
          value={abbe}
          onInput={(e) => setAbbe(e.currentTarget.value)}
        />
      </label>
      <label class="field">
        Lies on
        <select value={under} onChange={(e) => setUnder(e.currentTarget.value)}>
          <option value="air">air (free film)</option>
          <option value="pureWater">water</option>
          <option value="crownGlass">crown glass</option>
          <option value="windowGlass">window glass</option>
        </select>
      </label>
      <button type="button" class="primary" onClick={apply}>
        Use this film
      </button>
    </div>
  );
}
