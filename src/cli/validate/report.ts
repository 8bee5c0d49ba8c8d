import type { ErrorStatistics } from './statistics.ts';

/** Figures that issue "A measurement one can trust" sets for each kind of film. */
export const AIMS = {
  soap: { medianNm: 1.5, p90Nm: 4, offByMoreThan50: 0.001, coverage: [0.88, 0.92] },
  oil: { medianNm: 3, p90Nm: 8, offByMoreThan50: 0.003, coverage: [0.88, 0.92] },
} as const;

export type FilmKind = keyof typeof AIMS;

/** One line of the table. */
export interface ReportLine {
  readonly label: string;
  readonly figures: ErrorStatistics;
  readonly note: string;
}

const COLUMNS = ['median', 'p90', '> 50 nm', '90 % holds', 'no answer', 'film pixels'] as const;

function nm(value: number): string {
  if (Number.isNaN(value)) {
    return '-';
  }
  return Number.isFinite(value) ? `${value < 100 ? value.toFixed(1) : value.toFixed(0)} nm` : 'none';
}

function percent(share: number, digits: number): string {
  return Number.isNaN(share) ? '-' : `${(100 * share).toFixed(digits)} %`;
}

/** The table's cells for one set of figures, in the order of the heading. */
export function cells(figures: ErrorStatistics): string[] {
  return [
    nm(figures.medianNm),
    nm(figures.p90Nm),
    percent(figures.offByMoreThan50, 2),
    percent(figures.coverage, 1),
    percent(figures.withoutAnswer, 2),
    figures.filmPixels.toLocaleString('en-GB'),
  ];
}

/** A plain table: label column to the left, figures right-aligned, notes at the end. */
export function table(lines: readonly ReportLine[]): string {
  const rows = [
    ['', ...COLUMNS, ''],
    ...lines.map((line) => [line.label, ...cells(line.figures), line.note]),
  ];
  const widths = rows[0]!.map((_, column) => Math.max(...rows.map((row) => row[column]!.length)));
  const pad = (cell: string, column: number) =>
    column === 0 || column === widths.length - 1
      ? cell.padEnd(widths[column]!)
      : cell.padStart(widths[column]!);
  return rows.map((row) => row.map(pad).join('  ').trimEnd()).join('\n');
}

/** The same as a Markdown table, without the notes. */
export function markdownTable(lines: readonly ReportLine[]): string {
  const rows = [
    ['scene', ...COLUMNS],
    ['---', ...COLUMNS.map(() => '--:')],
    ...lines.map((line) => [line.label.trim(), ...cells(line.figures)]),
  ];
  return rows.map((row) => `| ${row.join(' | ')} |`).join('\n');
}

/** One sentence that holds pooled figures against the aims for a kind of film. */
export function verdict(name: string, kind: FilmKind, figures: ErrorStatistics): string {
  const aim = AIMS[kind];
  const checks: [string, boolean][] = [
    [`median ${nm(figures.medianNm)} (aim ${aim.medianNm} nm)`, figures.medianNm <= aim.medianNm],
    [`90th percentile ${nm(figures.p90Nm)} (aim ${aim.p90Nm} nm)`, figures.p90Nm <= aim.p90Nm],
    [
      `off by more than 50 nm ${percent(figures.offByMoreThan50, 2)} (aim ${percent(aim.offByMoreThan50, 1)})`,
      figures.offByMoreThan50 <= aim.offByMoreThan50,
    ],
    [
      `90 % interval holds ${percent(figures.coverage, 1)} (aim 88 to 92 %)`,
      figures.coverage >= aim.coverage[0] && figures.coverage <= aim.coverage[1],
    ],
  ];
  return `${name}: ${checks.map(([text, met]) => `${text} ${met ? 'met' : 'MISSED'}`).join('; ')}.`;
}
