import { useState } from 'preact/hooks';
import { deviceTime, observedTime } from '../../../engine/newObservation.ts';
import { timeWords } from '../../../record/inWords.ts';
import type { Observation } from '../../../record/observation.ts';
import { edit } from '../desk.ts';
import { Fact } from './Inputs.tsx';

const pad = (value: number) => String(value).padStart(2, '0');

/** "+02:00": this device's offset at an instant. */
export function deviceOffset(at: Date): string {
  const minutes = -at.getTimezoneOffset();
  const sign = minutes < 0 ? '-' : '+';
  return `${sign}${pad(Math.floor(Math.abs(minutes) / 60))}:${pad(Math.abs(minutes) % 60)}`;
}

/** When it was seen: the photo's clock, this device's, or as typed; UTC only where the offset is known. */
export function TimeFact({ observation }: { readonly observation: Observation }) {
  const { time } = observation;
  const clock = time?.recorded.slice(0, 16) ?? '';
  const offset = time?.offset ?? '';
  const [typed, setTyped] = useState<string | null>(null);
  const text = typed ?? offset;
  const isWrong = text !== '' && !/^(Z|[+-](0\d|1[0-4]):[0-5]\d)$/.test(text);

  /** Only what is changed gets the new source: an offset typed beside the photo's own clock leaves that clock as it is. */
  const set = (digits: string, zone: string, changes: 'clock' | 'offset', by: 'typed' | 'device') =>
    edit((before) => {
      if (digits === '') return { ...before, time: null };
      const whole =
        changes === 'offset' ? (before.time?.recorded.replace(/(Z|[+-]\d{2}:\d{2})$/, '') ?? digits) : digits;
      const source = changes === 'clock' ? by : (before.time?.source ?? by);
      const offsetSource = changes === 'offset' ? by : (before.time?.offsetSource ?? by);
      return {
        ...before,
        time: observedTime(`${seconds(whole)}${zone}`, source, zone ? offsetSource : null),
      };
    });

  return (
    <Fact name="Time" value={time && timeWords(time)}>
      <div class="pair clock">
        <label class="field">
          <span>Date and clock</span>
          <input
            type="datetime-local"
            value={clock}
            onChange={(event) => set(event.currentTarget.value, isWrong ? '' : text, 'clock', 'typed')}
          />
        </label>
        <label class="field">
          <span>Offset from UTC</span>
          <input
            type="text"
            placeholder="+02:00 or Z"
            value={text}
            aria-invalid={isWrong}
            onInput={(event) => {
              const next = event.currentTarget.value.trim().toUpperCase();
              setTyped(next);
              if (next === '' || /^(Z|[+-](0\d|1[0-4]):[0-5]\d)$/.test(next))
                set(clock, next, 'offset', 'typed');
            }}
          />
        </label>
      </div>
      {isWrong ? (
        <p role="alert" class="warn small">
          Type the offset like +02:00, or Z for UTC.
        </p>
      ) : null}
      <div class="row">
        <button
          type="button"
          class="plain"
          onClick={() => {
            setTyped(null);
            edit((before) => ({ ...before, time: deviceTime(new Date().toISOString()) }));
          }}
        >
          Now
        </button>
        {time && !time.offset ? (
          <button
            type="button"
            class="plain"
            onClick={() => {
              setTyped(null);
              set(clock, deviceOffset(new Date(`${time.recorded}`)), 'offset', 'device');
            }}
          >
            This device’s offset
          </button>
        ) : null}
      </div>
    </Fact>
  );
}

/** A field of the browser may leave the seconds out. */
function seconds(digits: string): string {
  return /T\d{2}:\d{2}$/.test(digits) ? `${digits}:00` : digits;
}
