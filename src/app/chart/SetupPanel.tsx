import type { IlluminantId } from '../../colour/types.ts';
import { FILM_PRESETS, type FilmPreset } from '../../engine/setup.ts';
import { FILM_NAMES, skyWords } from '../words/names.ts';
import { ASSUMED_DAYLIGHT_K, type ChartSetup, isSeenByEye } from './setupWords.ts';

/** Skies a person can name by looking up, and lamps of a bench. */
const SKIES_K = [5000, 5500, 6500, 8000, 12000];
const LAMPS: readonly (readonly [IlluminantId, string])[] = [
  ['A', 'Incandescent lamp'],
  ['LED-B3', 'LED, neutral white'],
  ['FL11', 'Fluorescent, three-band'],
];
export const REACHES_NM = [1000, 2000, 5000] as const;

const lightKey = (light: ChartSetup['light']): string =>
  light && 'illuminant' in light ? light.illuminant : String(light?.daylightK ?? ASSUMED_DAYLIGHT_K);

function lightOf(key: string): NonNullable<ChartSetup['light']> {
  const kelvin = Number(key);
  return Number.isFinite(kelvin) ? { daylightK: kelvin } : { illuminant: key as IlluminantId };
}

/** What the chart is drawn for. Pickers only: they work in gloves. */
export function SetupPanel({
  setup,
  reachNm,
  onSetup,
  onReach,
}: {
  readonly setup: ChartSetup;
  readonly reachNm: number;
  readonly onSetup: (setup: ChartSetup) => void;
  readonly onReach: (nm: number) => void;
}) {
  const key = lightKey(setup.light);
  const skies = SKIES_K.some((kelvin) => String(kelvin) === key) ? SKIES_K : [...SKIES_K, Number(key)];
  const lamps = LAMPS.some(([id]) => id === key) ? LAMPS : [...LAMPS, [key, `Illuminant ${key}`] as const];
  const incidence = setup.incidenceDeg ?? 0;
  return (
    <section aria-label="Chart set-up" class="chart-setup">
      <label class="field">
        Film
        <select
          value={typeof setup.film === 'string' ? setup.film : 'own'}
          onChange={(e) => {
            const film = e.currentTarget.value;
            if (film !== 'own') onSetup({ ...setup, film: film as FilmPreset });
          }}
        >
          {typeof setup.film === 'string' ? null : <option value="own">My own film</option>}
          {FILM_PRESETS.map((id) => (
            <option key={id} value={id}>
              {FILM_NAMES[id]}
            </option>
          ))}
        </select>
      </label>
      <label class="field">
        Light that it mirrors
        <select value={key} onChange={(e) => onSetup({ ...setup, light: lightOf(e.currentTarget.value) })}>
          {skies.filter(Number.isFinite).map((kelvin) => (
            <option key={kelvin} value={String(kelvin)}>
              Sky: {skyWords(kelvin)}, {kelvin.toLocaleString('en-GB')} K
            </option>
          ))}
          {(Number.isFinite(Number(key)) ? LAMPS : lamps).map(([id, name]) => (
            <option key={id} value={id}>
              {name}
            </option>
          ))}
        </select>
      </label>
      <label class="field">
        <span>Looked at {incidence}° from the vertical</span>
        <input
          type="range"
          min="0"
          max="80"
          step="5"
          value={incidence}
          onInput={(e) => onSetup({ ...setup, incidenceDeg: Number(e.currentTarget.value) })}
        />
      </label>
      <div class="chart-pair">
        <label class="field">
          Seen by
          <select
            value={isSeenByEye(setup.camera) ? 'cie1931' : 'phone'}
            onChange={(e) =>
              onSetup({ ...setup, camera: e.currentTarget.value === 'phone' ? 'phone' : 'cie1931' })
            }
          >
            <option value="cie1931">the eye</option>
            <option value="phone">a phone</option>
          </select>
        </label>
        <label class="field">
          Reaches to
          <select value={String(reachNm)} onChange={(e) => onReach(Number(e.currentTarget.value))}>
            {REACHES_NM.map((nm) => (
              <option key={nm} value={String(nm)}>
                {nm.toLocaleString('en-GB')} nm
              </option>
            ))}
          </select>
        </label>
      </div>
    </section>
  );
}
