import { conditionWords, SEA_STATE_WORDS } from '../../../record/inWords.ts';
import type { Conditions, Observation, Sky } from '../../../record/observation.ts';
import { edit } from '../desk.ts';
import { ChoiceField, Fact, NumberField, TextField } from './Inputs.tsx';
import { patched, said } from './patched.ts';

const SKIES: readonly (readonly [Sky, string])[] = [
  ['clear', 'Clear'],
  ['partlyCloudy', 'Partly cloudy'],
  ['overcast', 'Overcast'],
  ['fog', 'Fog'],
  ['rain', 'Rain'],
  ['night', 'Night'],
];

const SEAS = SEA_STATE_WORDS.map((words, degree) => [String(degree), `${degree}, ${words}`] as const);

const POLARISERS: readonly (readonly ['on' | 'off', string])[] = [
  ['off', 'None'],
  ['on', 'Polariser or polarised glass'],
];

/** Wind, sea and sky as they were; of a film at a bench only what was in front of the lens. */
export function ConditionsFact({ observation }: { readonly observation: Observation }) {
  const { conditions } = observation;
  const change = (patch: { readonly [K in keyof Conditions]?: Conditions[K] | undefined }) =>
    edit((before) => ({ ...before, conditions: patched(before.conditions, patch) }));
  const words = conditionWords(conditions);
  const polariser = (
    <ChoiceField
      label="In front of the lens"
      value={conditions.polariser}
      choices={POLARISERS}
      onValue={(chosen) => change({ polariser: chosen })}
    />
  );
  if (observation.viewpoint.from === 'bench')
    return (
      <Fact name="Polariser" value={words.length > 0 ? words.join(', ') : null}>
        {polariser}
      </Fact>
    );
  return (
    <Fact name="Wind, sea, sky" value={words.length > 0 ? words.join(', ') : null}>
      <div class="pair">
        <NumberField
          label="Wind, m/s"
          value={conditions.windMS}
          least={0}
          most={80}
          onValue={(windMS) => change({ windMS })}
        />
        <NumberField
          label="Wind from, degrees"
          value={conditions.windFromDeg}
          least={0}
          most={360}
          onValue={(windFromDeg) => change({ windFromDeg })}
        />
      </div>
      <div class="pair">
        <ChoiceField
          label="Sea"
          value={conditions.seaState === undefined ? undefined : String(conditions.seaState)}
          choices={SEAS}
          onValue={(degree) =>
            change({
              seaState: degree === undefined ? undefined : (Number(degree) as Conditions['seaState']),
            })
          }
        />
        <ChoiceField label="Sky" value={conditions.sky} choices={SKIES} onValue={(sky) => change({ sky })} />
      </div>
      {polariser}
      <TextField
        label="The water: colour, foam, weed, ice"
        value={conditions.waterRemarks ?? ''}
        onValue={(text) => change({ waterRemarks: said(text) })}
      />
    </Fact>
  );
}
