import { execFileSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

/** Spectra on an even wavelength grid, written as the text files that Argyll reads (CGATS.17). */
function cgats(
  kind: 'CTI3' | 'SPECT',
  wavelengthNm: Float64Array,
  rows: readonly ArrayLike<number>[],
): string {
  const bands = Array.from(wavelengthNm, (l) => `SPEC_${l}`);
  const chart = kind === 'CTI3';
  const fields = chart ? ['SAMPLE_ID', 'RGB_R', 'RGB_G', 'RGB_B', ...bands] : bands;
  return [
    kind,
    '',
    'DESCRIPTOR "film spectra"',
    'ORIGINATOR "test"',
    ...(chart ? ['DEVICE_CLASS "OUTPUT"', 'COLOR_REP "iRGB_LAB"'] : []),
    `SPECTRAL_BANDS "${bands.length}"`,
    `SPECTRAL_START_NM "${wavelengthNm[0]}"`,
    `SPECTRAL_END_NM "${wavelengthNm.at(-1)}"`,
    'SPECTRAL_NORM "100.0"',
    `NUMBER_OF_FIELDS ${fields.length}`,
    'BEGIN_DATA_FORMAT',
    fields.join(' '),
    'END_DATA_FORMAT',
    `NUMBER_OF_SETS ${rows.length}`,
    'BEGIN_DATA',
    ...rows.map((row, i) => [...(chart ? [i + 1, 0, 0, 0] : []), ...digits(row)].join(' ')),
    'END_DATA',
    '',
  ].join('\n');
}

function digits(row: ArrayLike<number>): string[] {
  return Array.from(row, (value) => value.toPrecision(12));
}

/**
 * XYZ (Y = 100 for a perfect white) that Argyll's spec2cie prints for reflectance spectra in percent under a light.
 * @returns three printed numbers a spectrum
 */
export function argyllXyz(
  observer: '1931_2' | '1964_10',
  wavelengthNm: Float64Array,
  lightPower: Float64Array,
  reflectancePercent: readonly ArrayLike<number>[],
): string[][] {
  const folder = mkdtempSync(join(tmpdir(), 'spec2cie-'));
  const [light, films, result] = ['light.sp', 'films.ti3', 'result.ti3'].map((name) => join(folder, name));
  try {
    writeFileSync(light!, cgats('SPECT', wavelengthNm, [lightPower]));
    writeFileSync(films!, cgats('CTI3', wavelengthNm, reflectancePercent));
    run(['-n', '-i', light!, '-o', observer, films!, result!]);
    return printedXyz(readFileSync(result!, 'utf8'));
  } finally {
    rmSync(folder, { recursive: true });
  }
}

function run(options: string[]): void {
  try {
    execFileSync('spec2cie', options, { encoding: 'utf8', stdio: 'pipe' });
  } catch (error) {
    if (error instanceof Error && 'code' in error && error.code === 'ENOENT')
      throw new Error('This check needs spec2cie of ArgyllCMS: apt-get install argyll');
    throw error;
  }
}

function printedXyz(text: string): string[][] {
  const format = /BEGIN_DATA_FORMAT\s+([\s\S]*?)\s+END_DATA_FORMAT/.exec(text)?.[1]?.split(/\s+/);
  const data = /BEGIN_DATA\s*\n([\s\S]*?)\nEND_DATA/.exec(text)?.[1];
  if (!format || !data) throw new Error('spec2cie wrote no data');
  const columns = ['XYZ_X', 'XYZ_Y', 'XYZ_Z'].map((name) => format.indexOf(name));
  if (columns.includes(-1)) throw new Error('spec2cie wrote no XYZ');
  return data.split('\n').map((line) => {
    const values = line.trim().split(/\s+/);
    return columns.map((column) => values[column]!);
  });
}

/** Half a unit of the sixth significant digit: spec2cie prints six and drops zeros at the end. */
export function halfSixthDigit(printed: string): number {
  return 0.5 * 10 ** (Math.floor(Math.log10(Math.abs(Number(printed)))) - 5);
}
