import { AREA_UNITS, VOLUME_UNITS } from '../../tally/units.ts';
import {
  AREA_CHOICES,
  type AreaUnitId,
  areaUnit,
  chooseAreaUnit,
  chooseVolumeUnit,
  VOLUME_CHOICES,
  type VolumeUnitId,
  volumeUnit,
} from '../amountUnits.ts';

/** Units of volume and area, with the kind of gallon and mile in the name. */
export function AmountUnits() {
  return (
    <div class="fields">
      <label class="field">
        Volume in
        <select
          value={volumeUnit.value ?? ''}
          onChange={(e) => chooseVolumeUnit((e.currentTarget.value || null) as VolumeUnitId | null)}
        >
          <option value="">metric, as fits</option>
          {VOLUME_CHOICES.map((id) => (
            <option key={id} value={id}>
              {VOLUME_UNITS[id].name}
            </option>
          ))}
        </select>
      </label>
      <label class="field">
        Area in
        <select
          value={areaUnit.value ?? ''}
          onChange={(e) => chooseAreaUnit((e.currentTarget.value || null) as AreaUnitId | null)}
        >
          <option value="">metric, as fits</option>
          {AREA_CHOICES.map((id) => (
            <option key={id} value={id}>
              {AREA_UNITS[id].name}
            </option>
          ))}
        </select>
      </label>
    </div>
  );
}
