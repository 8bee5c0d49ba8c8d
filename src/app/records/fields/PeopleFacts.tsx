import type { Observation } from '../../../record/observation.ts';
import { Icon } from '../../parts/Icon.tsx';
import { edit } from '../desk.ts';
import { rememberObserver } from '../observerMemory.ts';
import { Fact, TextField } from './Inputs.tsx';
import { patched, said } from './patched.ts';

const OBSERVER_FIELDS = [
  ['role', 'Role'],
  ['organisation', 'Organisation'],
  ['platform', 'Ship, aircraft or vehicle'],
  ['incident', 'Incident number'],
] as const;

/** Who observed; remembered for the next record, but for the incident. */
export function ObserverFact({ observation: { observer } }: { readonly observation: Observation }) {
  const words = OBSERVER_FIELDS.map(([id]) => observer[id]).filter(Boolean);
  return (
    <Fact name="Observer" value={words.length > 0 ? words.join(', ') : null}>
      {OBSERVER_FIELDS.map(([id, label]) => (
        <TextField
          key={id}
          label={label}
          value={observer[id] ?? ''}
          onValue={(text) =>
            edit((before) => {
              const next = { ...before, observer: patched(before.observer, { [id]: said(text) }) };
              rememberObserver(next);
              return next;
            })
          }
        />
      ))}
    </Fact>
  );
}

/** What it is, where somebody knows. */
export function OilFact({ observation: { substance } }: { readonly observation: Observation }) {
  const change = (patch: { name?: string; howKnown?: string | undefined }) =>
    edit((before) => {
      const next = patched(before.substance ?? { name: '' }, patch);
      return { ...before, substance: next.name.trim() || next.howKnown ? next : null };
    });
  return (
    <Fact name="Oil type" value={substance?.name || null}>
      <TextField
        label="What it is, if somebody knows"
        value={substance?.name ?? ''}
        onValue={(name) => change({ name })}
      />
      <TextField
        label="How that is known"
        placeholder="label of a drum, told by the master"
        value={substance?.howKnown ?? ''}
        onValue={(text) => change({ howKnown: said(text) })}
      />
    </Fact>
  );
}

/** Who has been told, when, and their reference. */
export function ToldFact({ observation: { toldTo } }: { readonly observation: Observation }) {
  const set = (next: Observation['toldTo']) => edit((before) => ({ ...before, toldTo: next }));
  const change = (index: number, patch: Partial<Observation['toldTo'][number]>) =>
    set(toldTo.map((one, i) => (i === index ? patched(one, patch) : one)));
  const names = toldTo.map(({ who }) => who).filter(Boolean);
  return (
    <Fact name="Told" value={names.length > 0 ? names.join(', ') : toldTo.length > 0 ? '' : null}>
      {toldTo.map(({ who, utc, reference }, i) => (
        <div class="told" key={i}>
          <TextField label="Who" value={who} onValue={(text) => change(i, { who: text })} />
          <TextField
            label="Their reference"
            value={reference ?? ''}
            onValue={(text) =>
              set(toldTo.map((one, k) => (k === i ? patched(one, { reference: said(text) }) : one)))
            }
          />
          <p class="small quiet">
            {utc ? `told ${utc.slice(0, 16).replace('T', ', ')} UTC` : 'time not said'}
          </p>
          <button
            type="button"
            class="plain"
            aria-label={`Remove ${who || 'this entry'}`}
            onClick={() => set(toldTo.filter((_, k) => k !== i))}
          >
            <Icon name="remove" />
          </button>
        </div>
      ))}
      <button
        type="button"
        class="plain"
        onClick={() => set([...toldTo, { who: '', utc: new Date().toISOString() }])}
      >
        <Icon name="plus" />
        Told now
      </button>
    </Fact>
  );
}
