import type { IlluminantId } from '../../colour/types.ts';
import { changeAndKeep } from '../session.ts';
import { setup } from '../state.ts';
import { skyWords } from '../words/names.ts';

const LAMPS: readonly (readonly [IlluminantId, string])[] = [
  ['A', 'incandescent (A)'],
  ['D50', 'viewing booth D50'],
  ['D65', 'viewing booth D65'],
  ['LED-B1', 'LED, warm white (B1)'],
  ['LED-B3', 'LED, neutral (B3)'],
  ['LED-B5', 'LED, cool white (B5)'],
  ['FL2', 'fluorescent, cool white (FL2)'],
  ['FL11', 'fluorescent, three-band (FL11)'],
];

/** What the film mirrors, and at what angle. */
export function LightStep() {
  const light = setup.value.light ?? { daylightK: 6500 };
  const daylightK = 'daylightK' in light ? light.daylightK : null;
  const incidence = setup.value.incidenceDeg ?? 0;
  return (
    <section aria-label="Light">
      <h1>What does the film mirror?</h1>
      <label class="field">
        Light
        <select
          value={'illuminant' in light ? light.illuminant : 'sky'}
          onChange={(e) => {
            const id = e.currentTarget.value;
            changeAndKeep({
              ...setup.value,
              light: id === 'sky' ? { daylightK: 6500 } : { illuminant: id as IlluminantId },
            });
          }}
        >
          <option value="sky">the sky</option>
          {LAMPS.map(([id, name]) => (
            <option key={id} value={id}>
              {name}
            </option>
          ))}
        </select>
      </label>
      {daylightK === null ? null : (
        <label class="field">
          <span>
            Sky: {skyWords(daylightK)}, about {daylightK.toLocaleString('en-GB')} K
          </span>
          <input
            type="range"
            min="4500"
            max="15000"
            step="100"
            value={daylightK}
            onChange={(e) =>
              changeAndKeep({ ...setup.value, light: { daylightK: Number(e.currentTarget.value) } })
            }
          />
        </label>
      )}
      <label class="field">
        <span>Looking down at {incidence}° from the vertical of the film</span>
        <input
          type="range"
          min="0"
          max="75"
          step="1"
          value={incidence}
          onChange={(e) => changeAndKeep({ ...setup.value, incidenceDeg: Number(e.currentTarget.value) })}
        />
      </label>
    </section>
  );
}
