import type { IlluminantId } from '../../colour/types.ts';
import { CameraPart, CameraSuggestion } from '../camera/CameraPart.tsx';
import { change, onWater, setup } from '../state.ts';
import { missingView } from '../viewState.ts';
import { incidenceWords, skyWords } from '../words/names.ts';
import { SkyGuess } from './SkyGuess.tsx';

const LAMPS: readonly (readonly [IlluminantId, string])[] = [
  ['LED-B1', 'LED, warm white (B1)'],
  ['LED-B3', 'LED, neutral (B3)'],
  ['LED-B5', 'LED, cool white (B5)'],
  ['A', 'incandescent (A)'],
  ['FL2', 'fluorescent, cool white (FL2)'],
  ['FL11', 'fluorescent, three-band (FL11)'],
  ['D50', 'viewing booth D50'],
  ['D65', 'viewing booth D65'],
];
const FIRST_SKY_K = 6500;

/** What the film mirrors, and at what angle. */
export function LightStep() {
  const light = setup.value.light ?? { daylightK: FIRST_SKY_K };
  const incidence = setup.value.incidenceDeg ?? 0;
  const tilted = onWater(setup.value.film) && missingView.value.length === 0;
  const isSky = 'daylightK' in light;
  return (
    <section aria-label="Light">
      <CameraSuggestion />
      <h1>What does the film mirror?</h1>
      <fieldset class="segments" aria-label="Light">
        <button
          type="button"
          aria-pressed={isSky}
          onClick={() => isSky || change({ ...setup.value, light: { daylightK: FIRST_SKY_K } })}
        >
          The sky
        </button>
        <button
          type="button"
          aria-pressed={!isSky}
          onClick={() => isSky && change({ ...setup.value, light: { illuminant: 'LED-B3' } })}
        >
          A lamp
        </button>
      </fieldset>
      {isSky && onWater(setup.value.film) ? <SkyGuess /> : null}
      {isSky ? (
        <label class="field">
          <span class="split">
            <span>{skyWords(light.daylightK)}</span>
            <span class="quiet">about {light.daylightK.toLocaleString('en-GB')} K</span>
          </span>
          <input
            class="sky"
            type="range"
            min="4500"
            max="15000"
            step="100"
            value={light.daylightK}
            aria-label="Colour of the sky, overcast to clear blue"
            aria-valuetext={`${skyWords(light.daylightK)}, about ${light.daylightK} kelvin`}
            onInput={(e) =>
              change({ ...setup.value, light: { daylightK: Number(e.currentTarget.value) } }, 'sky')
            }
          />
        </label>
      ) : (
        <label class="field">
          Lamp
          <select
            value={light.illuminant}
            onChange={(e) =>
              change({ ...setup.value, light: { illuminant: e.currentTarget.value as IlluminantId } })
            }
          >
            {LAMPS.map(([id, name]) => (
              <option key={id} value={id}>
                {name}
              </option>
            ))}
          </select>
        </label>
      )}
      {tilted ? (
        <p class="note small quiet">The view step gives each place its own angle.</p>
      ) : (
        <label class="field">
          <span class="split">
            <span>{incidenceWords(incidence, onWater(setup.value.film))}</span>
            <span class="quiet">{incidence}°</span>
          </span>
          <input
            type="range"
            min="0"
            max="75"
            step="1"
            value={incidence}
            aria-label={onWater(setup.value.film) ? 'Angle from straight down' : 'Angle from straight on'}
            aria-valuetext={`${incidence} degrees`}
            onInput={(e) =>
              change({ ...setup.value, incidenceDeg: Number(e.currentTarget.value) }, 'incidence')
            }
          />
        </label>
      )}
      <p class="small quiet">
        The mirrored part of the sky or the lamp counts, not the sun. The photo itself corrects a rough guess.
      </p>
      <CameraPart />
    </section>
  );
}
