import { useState } from 'preact/hooks';
import type { MaterialSetup, Setup } from '../../engine/setup.ts';
import { change, setup } from '../state.ts';

/** How well a typed index is taken to be known, one standard deviation: a handbook value at another temperature. */
const TYPED_SPREAD = 0.005;
const UNDER: readonly (readonly [string, string])[] = [
  ['air', 'air (free film)'],
  ['pureWater', 'water'],
  ['crownGlass', 'crown glass'],
  ['windowGlass', 'window glass'],
];

interface Typed {
  readonly nD: string;
  readonly abbe: string;
  readonly under: string;
}

/** What stands in the fields at first: the film in use where it is one's own. */
function typedFrom({ film }: Setup): Typed {
  const first = typeof film === 'string' ? undefined : film.layers[0]?.material;
  const own: MaterialSetup | null = typeof first === 'object' && 'nD' in first ? first : null;
  return {
    nD: own ? String(own.nD) : '1.40',
    abbe: String(own?.abbe ?? 55),
    under: typeof film !== 'string' && typeof film.substrate === 'string' ? film.substrate : 'air',
  };
}

/** Why the fields cannot be used yet, in a sentence that says what to type; null when they can. */
export function ownFilmFault(nD: number, abbe: number): string | null {
  if (!(nD >= 1 && nD <= 5))
    return 'The index n_D must lie between 1 and 5: 1.33 is water, 1.52 crown glass.';
  if (!(abbe >= 5 && abbe <= 200))
    return 'The Abbe number must lie between 5 and 200: 55 suits most liquids.';
  return null;
}

/** A film known by its index. */
export function OwnFilm() {
  const [typed, setTyped] = useState(() => typedFrom(setup.value));
  const [fault, setFault] = useState<string | null>(null);
  const inUse = typeof setup.value.film !== 'string';
  const apply = () => {
    const nD = Number(typed.nD.replace(',', '.'));
    const abbe = Number(typed.abbe.replace(',', '.'));
    const found = ownFilmFault(nD, abbe);
    setFault(found);
    if (found) return;
    change({
      ...setup.value,
      film: {
        ambient: 'air',
        layers: [{ material: { nD, abbe, spread: TYPED_SPREAD } }],
        substrate: typed.under,
      },
    });
  };
  return (
    <form
      class="fields"
      noValidate
      onSubmit={(event) => {
        event.preventDefault();
        apply();
      }}
    >
      <label class="field">
        Index n_D
        <input
          class="entry"
          inputMode="decimal"
          value={typed.nD}
          aria-invalid={fault?.includes('n_D') ?? false}
          onInput={(e) => setTyped({ ...typed, nD: e.currentTarget.value })}
        />
      </label>
      <label class="field">
        Abbe number
        <input
          class="entry"
          inputMode="decimal"
          value={typed.abbe}
          aria-invalid={fault?.includes('Abbe') ?? false}
          onInput={(e) => setTyped({ ...typed, abbe: e.currentTarget.value })}
        />
      </label>
      <label class="field wide">
        Lies on
        <select value={typed.under} onChange={(e) => setTyped({ ...typed, under: e.currentTarget.value })}>
          {UNDER.map(([id, name]) => (
            <option key={id} value={id}>
              {name}
            </option>
          ))}
        </select>
      </label>
      {fault ? (
        <p role="alert" class="warn wide">
          {fault}
        </p>
      ) : null}
      <button type="submit" class="plain wide">
        {inUse ? 'Use these values' : 'Use this film'}
      </button>
    </form>
  );
}
