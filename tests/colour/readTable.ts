import { readFileSync } from 'node:fs';
import { join } from 'node:path';

/** Rows of a table of published figures: lines that start with # say where they come from, the next names columns. */
export function readTable(name: string): Record<string, string>[] {
  const path = join(import.meta.dirname, '../reference/data', name);
  const [header, ...rows] = readFileSync(path, 'utf8')
    .trim()
    .split('\n')
    .filter((line) => !line.startsWith('#'))
    .map((line) => line.split(','));
  return rows.map((row) => Object.fromEntries(header!.map((column, i) => [column, row[i]!])));
}

/** A number of a row. */
export function figure(row: Record<string, string>, column: string): number {
  const value = Number(row[column]);
  if (row[column] === undefined || row[column] === '' || Number.isNaN(value))
    throw new Error(`no figure in column ${column}`);
  return value;
}

/** Half a unit of the last digit that a figure is printed with. */
export function halfLastDigit(printed: string): number {
  return 0.5 * 10 ** -(printed.split('.')[1]?.length ?? 0);
}
