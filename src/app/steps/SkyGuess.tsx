import { headingOf, sunOf } from '../../engine/tallyNotices.ts';
import { type Cloud, suggestSkyColour } from '../../view/skyColour.ts';
import { change, image, setup } from '../state.ts';
import { sunWords } from '../words/sunWords.ts';

const SKIES: readonly (readonly [Cloud, string])[] = [
  ['clear', 'Clear'],
  ['broken', 'Some cloud'],
  ['overcast', 'Overcast'],
];

/** With time and place known: the sky's colour by one tap on how it looked. */
export function SkyGuess() {
  const metadata = image.value?.opened.metadata;
  const sun = sunOf(setup.value, metadata);
  if (!sun || sun.elevationDeg <= 0) return null;
  const { light } = setup.value;
  return (
    <fieldset class="field">
      <legend class="small quiet">{sunWords(sun, headingOf(setup.value, metadata))}. How was the sky?</legend>
      <div class="segments words">
        {SKIES.map(([cloud, name]) => {
          const { kelvin } = suggestSkyColour(sun.elevationDeg, cloud);
          const isSet = light !== undefined && 'daylightK' in light && light.daylightK === kelvin;
          return (
            <button
              key={cloud}
              type="button"
              aria-pressed={isSet}
              onClick={() => change({ ...setup.value, light: { daylightK: kelvin } })}
            >
              {name}
            </button>
          );
        })}
      </div>
    </fieldset>
  );
}
