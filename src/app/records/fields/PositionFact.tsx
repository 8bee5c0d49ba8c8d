import { useState } from 'preact/hooks';
import { sourceWords } from '../../../record/inWords.ts';
import type { Observation } from '../../../record/observation.ts';
import { edit } from '../desk.ts';
import { positionShort } from '../figures.ts';
import { Fact, NumberField, TextField } from './Inputs.tsx';
import { patched, said } from './patched.ts';

/** A fix older than this is not taken, ms; waiting longer than that is given up. */
const OLDEST_MS = 30_000;
const LONGEST_MS = 20_000;

/** Where the camera stood, WGS 84: from the photo, this device, or as typed. */
export function PositionFact({ observation }: { readonly observation: Observation }) {
  const { position, placeName } = observation;
  const [words, setWords] = useState<string | null>(null);
  // One of two typed numbers waits for the other.
  const [half, setHalf] = useState<{ latitudeDeg?: number; longitudeDeg?: number }>({});
  const type = (part: { latitudeDeg?: number | undefined; longitudeDeg?: number | undefined }) => {
    const { latitudeDeg, longitudeDeg } = { ...position, ...half, ...part };
    setHalf(patched({ ...half }, part));
    const whole = latitudeDeg !== undefined && longitudeDeg !== undefined;
    edit((before) => ({
      ...before,
      position: whole ? { latitudeDeg, longitudeDeg, source: 'typed' } : null,
    }));
  };
  const locate = () => {
    setWords('Looking for the position …');
    navigator.geolocation.getCurrentPosition(
      ({ coords: { latitude, longitude, accuracy } }) => {
        setWords(null);
        setHalf({});
        edit((before) => ({
          ...before,
          position: {
            latitudeDeg: latitude,
            longitudeDeg: longitude,
            errorM: accuracy,
            source: 'geolocation',
          },
        }));
      },
      ({ code }) =>
        setWords(
          code === 1
            ? 'The browser may not tell the position: allow it in its settings, or type it.'
            : 'No position was found: try under the open sky, or type it.',
        ),
      { enableHighAccuracy: true, maximumAge: OLDEST_MS, timeout: LONGEST_MS },
    );
  };
  const error = position?.errorM === undefined ? '' : `, ± ${Math.round(position.errorM)} m`;
  return (
    <Fact name="Position" value={position ? positionShort(position) : (placeName ?? null)}>
      <div class="pair">
        <NumberField
          label="Latitude, degrees"
          value={position?.latitudeDeg ?? half.latitudeDeg}
          least={-90}
          most={90}
          onValue={(latitudeDeg) => type({ latitudeDeg })}
        />
        <NumberField
          label="Longitude, degrees"
          value={position?.longitudeDeg ?? half.longitudeDeg}
          least={-180}
          most={180}
          onValue={(longitudeDeg) => type({ longitudeDeg })}
        />
      </div>
      <p class="small quiet">
        WGS 84; south and west are negative.
        {position ? ` Now ${sourceWords(position.source)}${error}.` : ''}
      </p>
      {'geolocation' in navigator ? (
        <button type="button" class="plain" onClick={locate}>
          Use this device’s position
        </button>
      ) : null}
      {words ? (
        <p role="status" class="small">
          {words}
        </p>
      ) : null}
      <TextField
        label="Name of the place"
        value={placeName ?? ''}
        onValue={(text) => edit((before) => patched(before, { placeName: said(text) }))}
      />
    </Fact>
  );
}
