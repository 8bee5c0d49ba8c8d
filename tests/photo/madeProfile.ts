/** ICC profiles put together byte by byte for the tests (ICC.1:2022, 7, 9 and 10). */
const fixed = (value: number): number[] => {
  const bits = Math.round(value * 65536) >>> 0;
  return [bits >>> 24, (bits >>> 16) & 255, (bits >>> 8) & 255, bits & 255];
};
const u16 = (value: number): number[] => [(value >>> 8) & 255, value & 255];
const u32 = (value: number): number[] => [...u16(value >>> 16), ...u16(value & 65535)];
const letters = (text: string): number[] => [...text].map((letter) => letter.charCodeAt(0));

export const xyz = (x: number, y: number, z: number): number[] => [
  ...letters('XYZ '),
  ...u32(0),
  ...fixed(x),
  ...fixed(y),
  ...fixed(z),
];
export const curve = (...entries: number[]): number[] => [
  ...letters('curv'),
  ...u32(0),
  ...u32(entries.length),
  ...entries.flatMap(u16),
];
export const parametric = (kind: number, ...values: number[]): number[] => [
  ...letters('para'),
  ...u32(0),
  ...u16(kind),
  ...u16(0),
  ...values.flatMap(fixed),
];
/** `multiLocalizedUnicodeType` with one record a language. */
export const texts = (records: Record<string, string>): number[] => {
  const entries = Object.entries(records);
  let at = 16 + 12 * entries.length;
  const table: number[] = [];
  const body: number[] = [];
  for (const [language, text] of entries) {
    table.push(...letters(language), ...u32(2 * text.length), ...u32(at));
    body.push(...letters(text).flatMap(u16));
    at += 2 * text.length;
  }
  return [...letters('mluc'), ...u32(0), ...u32(entries.length), ...u32(12), ...table, ...body];
};
export const matrix = (values: readonly number[]): number[] => [
  ...letters('sf32'),
  ...u32(0),
  ...values.flatMap(fixed),
];

/** A version 4 display profile with the given elements, in the order given. */
export function profile(
  space: 'RGB ' | 'GRAY' | 'CMYK',
  tags: Record<string, readonly number[]>,
): Uint8Array {
  const entries = Object.entries(tags);
  const table: number[] = [];
  const body: number[] = [];
  let at = 132 + 12 * entries.length;
  for (const [tag, element] of entries) {
    const padded = [...element, ...new Array((4 - (element.length % 4)) % 4).fill(0)];
    table.push(...letters(tag), ...u32(at), ...u32(element.length));
    body.push(...padded);
    at += padded.length;
  }
  const header = [
    ...u32(at),
    ...u32(0),
    ...u32(0x04000000),
    ...letters('mntr'),
    ...letters(space),
    ...letters('XYZ '),
    ...new Array(12).fill(0),
    ...letters('acsp'),
    ...new Array(28).fill(0),
    ...fixed(0.9642),
    ...fixed(1),
    ...fixed(0.8249),
    ...new Array(48).fill(0),
  ];
  return Uint8Array.from([...header, ...u32(entries.length), ...table, ...body]);
}

/** The sRGB curve as phones' profiles write it: parametric type 3 (IEC 61966-2-1). */
export const SRGB_CURVE = parametric(3, 2.4, 1 / 1.055, 0.055 / 1.055, 1 / 12.92, 0.04045);

/** Bradford D65 to D50 (ICC.1:2022, annex E; the figures that profiles in circulation carry). */
export const CHAD_D65 = matrix([
  1.047882, 0.022918, -0.050217, 0.029586, 0.990479, -0.017059, -0.009232, 0.015076, 0.751678,
]);

/**
 * Display P3 in the manner of a phone: columns for D50 from SMPTE EG 432-1 primaries with D65, rounded as exiftool prints
 * them from ArgyllCMS's DisplayP3.icm (tests/photo/data).
 */
export const phoneP3 = (description = 'Display P3'): Uint8Array =>
  profile('RGB ', {
    desc: texts({ deDE: 'Anzeige P3', enUS: description }),
    wtpt: xyz(0.9642, 1, 0.8249),
    chad: CHAD_D65,
    rXYZ: xyz(0.51512, 0.2412, -0.00105),
    gXYZ: xyz(0.29198, 0.69225, 0.04189),
    bXYZ: xyz(0.1571, 0.06656, 0.78407),
    rTRC: SRGB_CURVE,
    gTRC: SRGB_CURVE,
    bTRC: SRGB_CURVE,
  });
