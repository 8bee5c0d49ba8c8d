/** Style of the report, on screen and on one A4 page; black on white whatever the theme. */
export const REPORT_CSS = `
.report { color: #000; background: #fff; font: 9.5pt/1.35 system-ui, "Segoe UI", Roboto, "DejaVu Sans", sans-serif; max-width: 186mm; margin: 0 auto; padding: 6mm; }
.report h1 { font-size: 15pt; line-height: 1.2; margin: 0 0 3mm; }
.report h2, .report caption { font-size: 9.5pt; font-weight: 700; text-align: left; margin: 0; padding: 0 0 0.6mm; }
.report p { margin: 0 0 1.5mm; }
.report .report-kind { font-weight: 600; margin: 0 0 1mm; }
.report .report-columns { columns: 1; column-gap: 6mm; margin-bottom: 3mm; }
.report figure, .report table, .report p, .report dt, .report dd, .report li { break-inside: avoid; }
.report h2, .report caption { break-after: avoid; }
.report figure { margin: 0 0 3mm; }
.report img { display: block; max-width: 100%; max-height: 78mm; }
.report .report-legend { display: block; width: 100%; max-width: 88mm; margin-top: 1.5mm; }
.report table { border-collapse: collapse; width: 100%; margin: 0 0 3mm; font-variant-numeric: tabular-nums; }
.report th, .report td { border-top: 0.3pt solid #666; padding: 0.6mm 1.5mm 0.6mm 0; text-align: right; font-weight: 400; vertical-align: top; }
.report thead th { border-top: 0; font-size: 8pt; }
.report th:first-child, .report td:last-child, .report thead th:last-child { text-align: left; }
.report td:last-child, .report thead th:last-child { padding-left: 1.5mm; }
.report dl { display: grid; grid-template-columns: 20mm 1fr; gap: 0.6mm 2mm; margin: 0 0 2.5mm; }
.report dt { font-weight: 600; }
.report dd { margin: 0; overflow-wrap: anywhere; }
.report ul { margin: 0 0 2.5mm; padding-left: 4mm; }
.report .report-remarks { white-space: pre-line; }
.report .report-small, .report .report-cautions, .report footer { font-size: 7.5pt; line-height: 1.3; }
.report .report-cautions ul { columns: 2; column-gap: 5mm; }
.report .report-cautions li { break-inside: avoid; }
.report footer { border-top: 0.3pt solid #666; padding-top: 1mm; }
.report code { overflow-wrap: anywhere; font-family: ui-monospace, "DejaVu Sans Mono", monospace; }
@media (min-width: 640px), print { .report .report-columns { columns: 2; } }
@page { size: A4; margin: 12mm; }
@media print { body { margin: 0; } .report { padding: 0; font-size: 8.5pt; max-width: none; } .report .report-cautions, .report .report-small, .report footer { font-size: 7pt; } }
`;
