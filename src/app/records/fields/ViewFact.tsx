import { viewpointWords } from '../../../record/inWords.ts';
import type { Observation, Viewpoint, ViewpointKind } from '../../../record/observation.ts';
import { edit } from '../desk.ts';
import { rememberObserver } from '../observerMemory.ts';
import { ChoiceField, Fact, NumberField } from './Inputs.tsx';
import { patched } from './patched.ts';

const FROM: readonly (readonly [ViewpointKind, string])[] = [
  ['shore', 'Shore, quay, bank'],
  ['vessel', 'Vessel'],
  ['aircraft', 'Aircraft'],
  ['drone', 'Drone'],
  ['bench', 'Bench, laboratory'],
];

const NORTHS: readonly (readonly ['true' | 'magnetic', string])[] = [
  ['true', 'true north'],
  ['magnetic', 'magnetic north'],
];

/** From where it was seen: what stood on, how high, looking where. */
export function ViewFact({ observation }: { readonly observation: Observation }) {
  const { viewpoint, setup } = observation;
  const { from, heightM, headingDeg, headingReference } = viewpoint;
  const change = (patch: { readonly [K in keyof Viewpoint]?: Viewpoint[K] | undefined }) =>
    edit((before) => {
      const next = { ...before, viewpoint: patched(before.viewpoint, patch) };
      if (patch.from) rememberObserver(next);
      return next;
    });
  const isMeasured = setup?.view !== undefined && heightM !== undefined;
  return (
    <Fact
      name="Seen"
      value={from === 'unknown' && !heightM && !headingDeg ? null : viewpointWords(viewpoint)}
    >
      <ChoiceField
        label="From"
        value={from === 'unknown' ? undefined : from}
        choices={FROM}
        onValue={(kind) => change({ from: kind ?? 'unknown' })}
      />
      {isMeasured ? (
        <p class="small quiet">
          Height {heightM?.value} m above the water, as the areas were worked out with. Change it in the View
          step of the photo.
        </p>
      ) : (
        <NumberField
          label="Height above the water, m"
          value={heightM?.value}
          least={0}
          most={20_000}
          onValue={(value) =>
            change({ heightM: value === undefined ? undefined : { value, source: 'typed' } })
          }
        />
      )}
      <div class="pair">
        <NumberField
          label="Looking along, degrees"
          value={headingDeg?.value}
          least={0}
          most={360}
          onValue={(value) =>
            change({ headingDeg: value === undefined ? undefined : { value, source: 'typed' } })
          }
        />
        <ChoiceField
          label="From which north"
          value={headingReference}
          choices={NORTHS}
          onValue={(reference) => change({ headingReference: reference })}
        />
      </div>
    </Fact>
  );
}
