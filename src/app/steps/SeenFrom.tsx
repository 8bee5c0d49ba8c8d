import { type Polariser, polariser, type Viewpoint, viewpoint, workOutAmount } from '../amountState.ts';

const PLACES: readonly (readonly [Viewpoint, string])[] = [
  ['unknown', 'not said'],
  ['shore', 'the shore'],
  ['vessel', 'a vessel'],
  ['drone', 'a drone'],
  ['aircraft', 'an aircraft'],
];
const FILTERS: readonly (readonly [Polariser, string])[] = [
  ['unknown', 'not known'],
  ['off', 'none'],
  ['on', 'on the lens'],
];

/** Whence the photo was taken, and through what: it decides how far the appearance code and the colours hold. */
export function SeenFrom() {
  return (
    <div class="fields">
      <label class="field">
        Seen from
        <select
          value={viewpoint.value}
          onChange={(e) => {
            viewpoint.value = e.currentTarget.value as Viewpoint;
            void workOutAmount();
          }}
        >
          {PLACES.map(([id, name]) => (
            <option key={id} value={id}>
              {name}
            </option>
          ))}
        </select>
      </label>
      <label class="field">
        Polariser
        <select
          value={polariser.value}
          onChange={(e) => {
            polariser.value = e.currentTarget.value as Polariser;
            void workOutAmount();
          }}
        >
          {FILTERS.map(([id, name]) => (
            <option key={id} value={id}>
              {name}
            </option>
          ))}
        </select>
      </label>
    </div>
  );
}
