/** What a quantity is counted in. Factors are exact: the inch, the gallons and the miles are defined so. */
export interface Unit {
  readonly id: string;
  /** In words, singular, with the kind of mile or gallon named. */
  readonly name: string;
  readonly symbol: string;
  /** How many base units (metre, cubic metre, square metre) make one. */
  readonly factor: number;
}

const LITRE_M3 = 1e-3;
/** 231 cubic inches; inch 0.0254 m (1959 agreement). */
const US_GALLON_M3 = 231 * 0.0254 ** 3;
const STATUTE_MILE_M = 1609.344;
const NAUTICAL_MILE_M = 1852;

/** Base unit: metre. */
export const THICKNESS_UNITS = {
  nm: { id: 'nm', name: 'nanometre', symbol: 'nm', factor: 1e-9 },
  um: { id: 'um', name: 'micrometre', symbol: 'µm', factor: 1e-6 },
  mm: { id: 'mm', name: 'millimetre', symbol: 'mm', factor: 1e-3 },
} as const satisfies Record<string, Unit>;

/** Base unit: cubic metre. The imperial gallon is 4.54609 L by definition; a barrel of oil is 42 US gallons. */
export const VOLUME_UNITS = {
  uL: { id: 'uL', name: 'microlitre', symbol: 'µL', factor: 1e-9 },
  mL: { id: 'mL', name: 'millilitre', symbol: 'mL', factor: 1e-6 },
  L: { id: 'L', name: 'litre', symbol: 'L', factor: LITRE_M3 },
  m3: { id: 'm3', name: 'cubic metre', symbol: 'm³', factor: 1 },
  usGallon: { id: 'usGallon', name: 'US gallon', symbol: 'US gal', factor: US_GALLON_M3 },
  imperialGallon: {
    id: 'imperialGallon',
    name: 'imperial gallon',
    symbol: 'imp gal',
    factor: 4.54609 * LITRE_M3,
  },
  barrel: { id: 'barrel', name: 'barrel (42 US gallons)', symbol: 'bbl', factor: 42 * US_GALLON_M3 },
} as const satisfies Record<string, Unit>;

/** Base unit: square metre. The acre is the international one, a 640th of a square statute mile. */
export const AREA_UNITS = {
  m2: { id: 'm2', name: 'square metre', symbol: 'm²', factor: 1 },
  ha: { id: 'ha', name: 'hectare', symbol: 'ha', factor: 1e4 },
  km2: { id: 'km2', name: 'square kilometre', symbol: 'km²', factor: 1e6 },
  nauticalSquareMile: {
    id: 'nauticalSquareMile',
    name: 'square nautical mile',
    symbol: 'nmi²',
    factor: NAUTICAL_MILE_M ** 2,
  },
  statuteSquareMile: {
    id: 'statuteSquareMile',
    name: 'square statute mile',
    symbol: 'statute mi²',
    factor: STATUTE_MILE_M ** 2,
  },
  acre: { id: 'acre', name: 'acre', symbol: 'acre', factor: STATUTE_MILE_M ** 2 / 640 },
} as const satisfies Record<string, Unit>;

/** Base unit: metre. */
export const LENGTH_UNITS = {
  m: { id: 'm', name: 'metre', symbol: 'm', factor: 1 },
  km: { id: 'km', name: 'kilometre', symbol: 'km', factor: 1000 },
  foot: { id: 'foot', name: 'foot', symbol: 'ft', factor: 0.3048 },
  nauticalMile: { id: 'nauticalMile', name: 'nautical mile', symbol: 'nmi', factor: NAUTICAL_MILE_M },
  statuteMile: { id: 'statuteMile', name: 'statute mile', symbol: 'statute mi', factor: STATUTE_MILE_M },
} as const satisfies Record<string, Unit>;

/** A value in base units, in `unit`. */
export function inUnit(baseValue: number, unit: Unit): number {
  return baseValue / unit.factor;
}

/** A value in `unit`, in base units. */
export function fromUnit(value: number, unit: Unit): number {
  return value * unit.factor;
}

/** Film volume in cubic metres: 1 nm over 1 m2 is 1e-9 m3, 1 um over 1 km2 is 1 m3. */
export function filmVolumeM3(thicknessNm: number, areaM2: number): number {
  return thicknessNm * 1e-9 * areaM2;
}

/** The metric volume unit in which `m3` reads as 1 to 1000 where there is one. */
export function readableVolumeUnit(m3: number): Unit {
  const size = Math.abs(m3);
  return size >= 1
    ? VOLUME_UNITS.m3
    : size >= 1e-3
      ? VOLUME_UNITS.L
      : size >= 1e-6 || size === 0
        ? VOLUME_UNITS.mL
        : VOLUME_UNITS.uL;
}

/** The metric area unit in which `m2` reads best: square metres to one hectare, hectares to one square kilometre. */
export function readableAreaUnit(m2: number): Unit {
  return m2 >= 1e6 ? AREA_UNITS.km2 : m2 >= 1e4 ? AREA_UNITS.ha : AREA_UNITS.m2;
}
