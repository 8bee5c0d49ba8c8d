import { useState } from 'preact/hooks';
import { Icon } from './Icon.tsx';

export interface EntryUnit {
  readonly symbol: string;
  /** In words, for a screen reader. */
  readonly name: string;
  /** How many base units make one. */
  readonly factor: number;
}

interface Props {
  readonly label: string;
  /** In base units; null where nothing is told. */
  readonly value: number | null;
  /** One unit, or several of which one is chosen. */
  readonly units: readonly [EntryUnit, ...EntryUnit[]];
  readonly low: number;
  readonly high: number;
  /** What − and + put where nothing is told, in the unit shown. */
  readonly start?: number;
  /** How far − and + go from a value, in the unit shown. */
  readonly stepOf?: (value: number) => number;
  readonly onChange: (value: number | null, series: string | null) => void;
}

const SERIES_DIGITS = 4;

/** "Type a number from 0.05 to 20,000 m." */
const faultWords = (low: number, high: number, symbol: string) =>
  `Type a number from ${tidy(low)} to ${tidy(high)} ${symbol}, or leave it empty.`;

const tidy = (value: number) => Number(value.toPrecision(SERIES_DIGITS)).toLocaleString('en-GB');

/** A large number with − and +, and its unit as a switch; a comma is a decimal point too. */
export function NumberEntry({ label, value, units, low, high, start, stepOf, onChange }: Props) {
  const [chosen, setChosen] = useState(0);
  const [fault, setFault] = useState(false);
  const unit = units[chosen] ?? units[0];
  const shown = value === null ? null : Number((value / unit.factor).toPrecision(SERIES_DIGITS));
  const within = (base: number) => Math.min(high, Math.max(low, base));
  const step = (sign: 1 | -1) => {
    setFault(false);
    if (shown === null) return onChange(within((start ?? 1) * unit.factor), null);
    const by = stepOf?.(sign > 0 ? shown : shown * (1 - 1e-9)) ?? 1;
    const next = (sign > 0 ? Math.floor(shown / by + 1e-6) + 1 : Math.ceil(shown / by - 1e-6) - 1) * by;
    onChange(within(Number(next.toPrecision(SERIES_DIGITS)) * unit.factor), label);
  };
  const typed = (text: string) => {
    const clean = text.trim().replace(',', '.');
    if (clean === '') {
      setFault(false);
      return onChange(null, null);
    }
    const base = Number(clean) * unit.factor;
    const isFit = base >= low && base <= high;
    setFault(!isFit);
    if (isFit) onChange(base, null);
  };
  return (
    <div class="number">
      <span class="name" aria-hidden="true">
        {label}
      </span>
      <div class="number-row">
        {stepOf ? (
          <button type="button" aria-label={`${label}: less`} onClick={() => step(-1)}>
            <Icon name="minus" />
          </button>
        ) : null}
        <input
          class="entry"
          inputMode="decimal"
          autocomplete="off"
          aria-label={`${label}, in ${unit.name}`}
          aria-invalid={fault}
          placeholder="–"
          value={shown === null ? '' : String(shown)}
          onChange={(e) => typed(e.currentTarget.value)}
          onKeyDown={(e) => {
            if (e.key === 'Enter') e.currentTarget.blur();
          }}
        />
        {units.length > 1 ? (
          <button
            type="button"
            class="plain unit"
            aria-label={`Unit ${unit.symbol}, ${unit.name}. Change to ${units[(chosen + 1) % units.length]?.name}`}
            onClick={() => setChosen((chosen + 1) % units.length)}
          >
            {unit.symbol}
          </button>
        ) : (
          <span class="unit" aria-hidden="true">
            {unit.symbol}
          </span>
        )}
        {stepOf ? (
          <button type="button" aria-label={`${label}: more`} onClick={() => step(1)}>
            <Icon name="plus" />
          </button>
        ) : null}
      </div>
      {fault ? (
        <span role="alert" class="small warn">
          {faultWords(low / unit.factor, high / unit.factor, unit.symbol)}
        </span>
      ) : null}
    </div>
  );
}
