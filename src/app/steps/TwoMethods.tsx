import { codeVolumeFigures, volumeFigures } from '../../record/inWords.ts';
import type { VolumeByCode } from '../../tally/appearanceCode.ts';
import { readableVolumeUnit } from '../../tally/units.ts';
import type { VolumeByThickness } from '../../tally/volumeByThickness.ts';
import { volumeUnitOf } from '../amountUnits.ts';
import { grouped } from '../words/numbers.ts';

interface Props {
  readonly byThickness: VolumeByThickness;
  readonly byCode: VolumeByCode | null;
}

/** Both volumes beside each other, in one unit, over one axis: never one bare number. */
export function TwoMethods({ byThickness, byCode }: Props) {
  const { volumeM3 } = byThickness;
  const unit = volumeUnitOf() ?? readableVolumeUnit(volumeM3.best);
  const thick = volumeFigures(volumeM3, unit);
  const coded = byCode && codeVolumeFigures(byCode.minM3, byCode.maxM3, unit);
  return (
    <>
      <div class="methods">
        <div>
          <h2 class="i-thickness">By thickness</h2>
          <p class="volume">
            {byThickness.atLeast ? <small>at least</small> : null}
            {grouped(thick.least)} to {grouped(thick.most)} <span>{unit.symbol}</span>
          </p>
          <p class="small quiet">
            best {grouped(thick.best)} {unit.symbol}, 9 in 10 sure
          </p>
        </div>
        <div>
          <h2 class="i-code">By appearance code</h2>
          {byCode && coded ? (
            <>
              <p class="volume">
                {byCode.atLeast ? <small>at least</small> : null}
                {grouped(coded.least)} to {grouped(coded.most)} <span>{unit.symbol}</span>
              </p>
              <p class="small quiet">least to most by the code, no best</p>
            </>
          ) : (
            <p class="small quiet">No film thick enough to have a code.</p>
          )}
        </div>
      </div>
      {byCode ? <Bars byThickness={byThickness} byCode={byCode} /> : null}
    </>
  );
}

/** Both intervals on one logarithmic axis. The figures above say the same in words. */
function Bars({
  byThickness,
  byCode,
}: {
  readonly byThickness: VolumeByThickness;
  readonly byCode: VolumeByCode;
}) {
  const { least, best, most } = byThickness.volumeM3;
  const ends = [least, most, byCode.minM3, byCode.maxM3].filter((m3) => m3 > 0);
  if (ends.length < 2) return null;
  const low = Math.log(Math.min(...ends) / 1.15);
  const high = Math.log(Math.max(...ends) * 1.15);
  const at = (m3: number) => (m3 > 0 ? Math.max(0, (100 * (Math.log(m3) - low)) / (high - low)) : 0);
  return (
    <svg class="bars" viewBox="0 0 100 26" preserveAspectRatio="none" aria-hidden="true">
      <rect class="thickness" x={at(least)} y="2" width={Math.max(0.8, at(most) - at(least))} height="9" />
      <rect class="best" x={at(best) - 0.4} y="0" width="0.8" height="13" />
      <rect class="code" x={at(byCode.minM3)} y="15" width={at(byCode.maxM3) - at(byCode.minM3)} height="9" />
    </svg>
  );
}
