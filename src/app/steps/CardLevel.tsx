import { useState } from 'preact/hooks';
import { change, setup } from '../state.ts';

const LEAST_PERCENT = 0.5;

/** The reflectance that is printed on a card; without it the card gives the colour of the light, not its level. */
export function CardLevel() {
  const references = setup.value.references ?? {};
  const [fault, setFault] = useState(false);
  return (
    <label class="field">
      Reflectance of the card, %, if it is stated on it
      <input
        class="entry"
        inputMode="decimal"
        aria-invalid={fault}
        value={
          references.whiteReflectance === undefined
            ? ''
            : String(Math.round(references.whiteReflectance * 1000) / 10)
        }
        onChange={(e) => {
          const text = e.currentTarget.value.trim().replace(',', '.');
          const percent = Number(text);
          const { whiteReflectance: _, ...others } = references;
          const valid = percent >= LEAST_PERCENT && percent <= 100;
          setFault(text !== '' && !valid);
          if (text !== '' && !valid) return;
          change({
            ...setup.value,
            references: valid ? { ...others, whiteReflectance: percent / 100 } : others,
          });
        }}
      />
      {fault ? (
        <span role="alert" class="warn">
          Type a percentage between {LEAST_PERCENT} and 100, such as 18, or leave it empty.
        </span>
      ) : null}
    </label>
  );
}
