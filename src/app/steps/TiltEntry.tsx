import { useState } from 'preact/hooks';
import { NumberEntry } from '../parts/NumberEntry.tsx';
import { hasTiltSensor, readTilt } from '../readTilt.ts';
import { image, setup } from '../state.ts';
import { changeView } from '../viewState.ts';
import { DEGREES } from '../words/entryUnits.ts';

const DEGREE = Math.PI / 180;
const tenth = (degrees: number) => Math.round(10 * degrees) / 10;

/** Pitch and roll, typed, as the photo says, or from the phone held as it was. */
export function TiltEntry() {
  const { pitchDeg, rollDeg } = setup.value.view ?? {};
  const [note, setNote] = useState<string | null>(null);
  const [listening, setListening] = useState(false);
  const own = image.value?.opened.metadata.elevationDeg;
  const listen = async () => {
    setListening(true);
    setNote(null);
    try {
      const tilt = await readTilt();
      changeView({ pitchDeg: tenth(tilt.pitchRad / DEGREE), rollDeg: tenth(tilt.rollRad / DEGREE) });
    } catch (error) {
      setNote(error instanceof Error ? error.message : String(error));
    } finally {
      setListening(false);
    }
  };
  return (
    <>
      <NumberEntry
        label="Tilted down from level"
        value={pitchDeg === undefined ? null : tenth(-pitchDeg)}
        units={DEGREES}
        low={-90}
        high={90}
        start={30}
        stepOf={() => 1}
        onChange={(value, series) => changeView({ pitchDeg: value === null ? undefined : -value }, series)}
      />
      {own !== undefined && pitchDeg === undefined ? (
        <button type="button" class="plain" onClick={() => changeView({ pitchDeg: tenth(own) })}>
          {tenth(-own)}° down, as the photo says
        </button>
      ) : null}
      {hasTiltSensor() ? (
        <button type="button" class="plain" disabled={listening} onClick={() => void listen()}>
          {listening ? 'Hold still' : 'Hold the phone as for the photo, tap'}
        </button>
      ) : null}
      {note ? (
        <p role="alert" class="small warn">
          {note}
        </p>
      ) : null}
      <NumberEntry
        label="Turned clockwise"
        value={rollDeg ?? null}
        units={DEGREES}
        low={-180}
        high={180}
        start={0}
        stepOf={() => 1}
        onChange={(value, series) => changeView({ rollDeg: value ?? undefined }, series)}
      />
    </>
  );
}
