import { sanityChecks } from '../../tally/sanityChecks.ts';
import { slopeVariance } from '../../view/seaSlope.ts';
import { NumberEntry } from '../parts/NumberEntry.tsx';
import { change, setup } from '../state.ts';
import { WINDS } from '../words/entryUnits.ts';

/** Wind speed, and what it does to the colours. */
export function WindEntry() {
  const { windMS } = setup.value;
  return (
    <>
      <NumberEntry
        label="Wind"
        value={windMS ?? null}
        units={WINDS}
        low={0}
        high={60}
        start={3}
        stepOf={() => 1}
        onChange={(value, series) => {
          const { windMS: _, ...rest } = setup.value;
          change(value === null ? rest : { ...rest, windMS: value }, series);
        }}
      />
      <p class="small quiet">{windWords(windMS)}</p>
    </>
  );
}

/** What a wind does: how far its waves lean (Cox and Munk's mean square slope under a slick), and where it misleads. */
function windWords(windMS: number | undefined): string {
  if (windMS === undefined)
    return 'Waves spread the angles and fade the colours. Left empty, the water counts as flat.';
  const leanDeg = (Math.atan(Math.sqrt(slopeVariance(windMS, 'slick').total)) * 180) / Math.PI;
  const lean = `Under a film, open water leans about ${Math.round(leanDeg)}° in this wind: colours fade and their intervals widen.`;
  return [lean, ...sanityChecks({ windMS }).map(({ text }) => text)].join(' ');
}
