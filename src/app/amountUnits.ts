import { signal } from '@preact/signals';
import { AREA_UNITS, type Unit, VOLUME_UNITS } from '../tally/units.ts';

/** Units in which the amount is shown; null picks the metric one that reads best. */
export type VolumeUnitId = keyof typeof VOLUME_UNITS;
export type AreaUnitId = keyof typeof AREA_UNITS;

const VOLUME_KEY = 'tintfathom.volumeUnit';
const AREA_KEY = 'tintfathom.areaUnit';

export const VOLUME_CHOICES: readonly VolumeUnitId[] = [
  'mL',
  'L',
  'm3',
  'usGallon',
  'imperialGallon',
  'barrel',
];
export const AREA_CHOICES: readonly AreaUnitId[] = [
  'm2',
  'ha',
  'km2',
  'nauticalSquareMile',
  'statuteSquareMile',
];

export const volumeUnit = signal<VolumeUnitId | null>(kept(VOLUME_KEY, VOLUME_CHOICES));
export const areaUnit = signal<AreaUnitId | null>(kept(AREA_KEY, AREA_CHOICES));

export function chooseVolumeUnit(id: VolumeUnitId | null): void {
  volumeUnit.value = id;
  keep(VOLUME_KEY, id);
}

export function chooseAreaUnit(id: AreaUnitId | null): void {
  areaUnit.value = id;
  keep(AREA_KEY, id);
}

export const volumeUnitOf = (): Unit | undefined =>
  volumeUnit.value ? VOLUME_UNITS[volumeUnit.value] : undefined;
export const areaUnitOf = (): Unit | undefined => (areaUnit.value ? AREA_UNITS[areaUnit.value] : undefined);

function kept<T extends string>(key: string, choices: readonly T[]): T | null {
  try {
    const id = localStorage.getItem(key);
    return choices.find((choice) => choice === id) ?? null;
  } catch {
    return null;
  }
}

function keep(key: string, id: string | null): void {
  try {
    if (id) localStorage.setItem(key, id);
    else localStorage.removeItem(key);
  } catch {
    // Only the convenience is lost.
  }
}
