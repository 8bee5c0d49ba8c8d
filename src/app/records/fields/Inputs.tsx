import type { ComponentChildren } from 'preact';
import { useState } from 'preact/hooks';

/** One thing that can be known: what is known of it in a line; tapped, its fields. */
export function Fact({
  name,
  value,
  children,
}: {
  readonly name: string;
  /** Null where it is not known. */
  readonly value: string | null;
  readonly children: ComponentChildren;
}) {
  return (
    <details class="fact">
      <summary>
        <span class="fact-name">{name}</span>
        <span class={value === null ? 'fact-value quiet' : 'fact-value'}>{value ?? 'not known'}</span>
      </summary>
      <div class="fact-fields">{children}</div>
    </details>
  );
}

interface TextFieldGiven {
  readonly label: string;
  readonly value: string;
  readonly onValue: (text: string) => void;
  readonly placeholder?: string;
}

export function TextField({ label, value, onValue, placeholder = '' }: TextFieldGiven) {
  return (
    <label class="field">
      <span>{label}</span>
      <input
        type="text"
        value={value}
        placeholder={placeholder}
        onInput={(event) => onValue(event.currentTarget.value)}
      />
    </label>
  );
}

export function LongTextField({ label, value, onValue, placeholder = '' }: TextFieldGiven) {
  return (
    <label class="field">
      <span>{label}</span>
      <textarea
        rows={4}
        value={value}
        placeholder={placeholder}
        onInput={(event) => onValue(event.currentTarget.value)}
      />
    </label>
  );
}

/** A number with comma or point, or nothing; what is no number, or out of bounds, is said and not taken. */
export function NumberField({
  label,
  value,
  least,
  most,
  onValue,
}: {
  readonly label: string;
  readonly value: number | undefined;
  readonly least: number;
  readonly most: number;
  readonly onValue: (value: number | undefined) => void;
}) {
  const [typed, setTyped] = useState<string | null>(null);
  const [isWrong, setWrong] = useState(false);
  const text = typed ?? (value === undefined ? '' : String(value));
  const type = (next: string) => {
    setTyped(next);
    const number = Number(next.trim().replace(',', '.'));
    const isEmpty = next.trim() === '';
    const fits = !isEmpty && number >= least && number <= most;
    setWrong(!isEmpty && !fits);
    if (isEmpty) onValue(undefined);
    else if (fits) onValue(number);
  };
  return (
    <label class="field">
      <span>{label}</span>
      <input
        type="text"
        inputMode={least < 0 ? 'text' : 'decimal'}
        value={text}
        aria-invalid={isWrong}
        onInput={(event) => type(event.currentTarget.value)}
        onBlur={() => {
          if (!isWrong) setTyped(null);
        }}
      />
      {isWrong ? (
        <span class="warn small" role="alert">
          Type a number from {least} to {most}.
        </span>
      ) : null}
    </label>
  );
}

/** One of a few; the empty choice is "not known". */
export function ChoiceField<T extends string>({
  label,
  value,
  choices,
  onValue,
  none = 'not known',
}: {
  readonly label: string;
  readonly value: T | undefined;
  readonly choices: readonly (readonly [T, string])[];
  readonly onValue: (value: T | undefined) => void;
  readonly none?: string | null;
}) {
  return (
    <label class="field">
      <span>{label}</span>
      <select
        value={value ?? ''}
        onChange={(event) => onValue(choices.find(([id]) => id === event.currentTarget.value)?.[0])}
      >
        {none === null ? null : <option value="">{none}</option>}
        {choices.map(([id, name]) => (
          <option key={id} value={id}>
            {name}
          </option>
        ))}
      </select>
    </label>
  );
}
