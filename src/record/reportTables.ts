import { APPEARANCE_CODE_SCOPE, APPEARANCES } from '../tally/appearanceCode.ts';
import { thicknessQuantiles } from '../tally/rounding.ts';
import { ANSWER_WORDS, amountAnswer } from './amountAnswer.ts';
import { html, type SafeHtml } from './html.ts';
import {
  areaFigures,
  codeVolumeFigures,
  percentWords,
  pixelCoverageWords,
  plural,
  volumeFigures,
} from './inWords.ts';
import type { Observation, RecordedResult } from './observation.ts';

/** Tables of how much: both volumes side by side, the area, the shares of the code, and the thickness of the film. */
export function amountTables({ result, slickByEye, viewpoint }: Observation): SafeHtml {
  if (!result) return html`<p class="report-none">No result is in this record.</p>`;
  const eye = slickByEye?.lengthM !== undefined && slickByEye.widthM !== undefined ? slickByEye : null;
  const answer = amountAnswer(result);
  const said = answer === 'noOil' || answer === 'noAnswer' ? ANSWER_WORDS[answer] : null;
  return html`${said ? html`<p>${said}.</p>` : (result.byThickness || result.byCode) && volumeTable(result)}
${!said && (result.byThickness ? areaTable(result) : coverageLine(result))}
${eye && html`<p>By eye ${eye.lengthM} m × ${eye.widthM} m${eye.coverage === undefined ? '' : `, ${percentWords(eye.coverage)} oiled`}.</p>`}
${result.byCode && shareTable(result.byCode)}
${result.byCode && viewpoint.from !== 'aircraft' && html`<p class="report-small">${APPEARANCE_CODE_SCOPE}</p>`}
${thicknessLine(result)}
${result.drainage.map(drainageTable)}`;
}

function volumeTable({ byThickness, byCode }: RecordedResult): SafeHtml {
  const thickness = byThickness && volumeFigures(byThickness.volumeM3);
  const code = byCode && byCode.maxM3 > 0 && codeVolumeFigures(byCode.minM3, byCode.maxM3);
  return html`<table>
<caption>Volume, by both methods</caption>
<thead><tr><th scope="col">Method</th><th scope="col">Least</th><th scope="col">Best</th><th scope="col">Most</th><th scope="col">Unit</th></tr></thead>
<tbody>
${thickness && html`<tr><th scope="row">By thickness${byThickness.atLeast && ', at least'}</th><td>${thickness.least}</td><td>${thickness.best}</td><td>${thickness.most}</td><td>${plural(thickness.unit.name, 2)}</td></tr>`}
${code && html`<tr><th scope="row">By appearance code${byCode.atLeast && ', at least'}</th><td>${code.least}</td><td>–</td><td>${code.most}</td><td>${plural(code.unit.name, 2)}</td></tr>`}
</tbody>
</table>`;
}

function areaTable({ byThickness, area }: RecordedResult): SafeHtml {
  const oiled = byThickness && areaFigures(byThickness.oiledM2);
  const share = (value: number | null | undefined) => (value == null ? '–' : Math.round(100 * value));
  return html`<table>
<caption>Area</caption>
<thead><tr><th scope="col"></th><th scope="col">Least</th><th scope="col">Best</th><th scope="col">Most</th><th scope="col">Unit</th></tr></thead>
<tbody>
${oiled && html`<tr><th scope="row">Oiled area</th><td>${oiled.least}</td><td>${oiled.best}</td><td>${oiled.most}</td><td>${plural(oiled.unit.name, 2)}</td></tr>`}
${area && html`<tr><th scope="row">Coverage</th><td>${share(area.coverageLeast)}</td><td>${share(area.coverage)}</td><td>${share(area.coverageMost)}</td><td>% of the water looked at</td></tr>`}
</tbody>
</table>`;
}

/** How much of what was read is film, where no area is known. */
function coverageLine({ summary, byCode }: RecordedResult): SafeHtml | null {
  const words = summary && !byCode && pixelCoverageWords(summary);
  return words ? html`<p>${words}</p>` : null;
}

function shareTable({ shares, parts }: NonNullable<RecordedResult['byCode']>): SafeHtml {
  const rows = APPEARANCES.flatMap(({ code, name, minUm, maxUm, openEnded }) => {
    const share = shares[code - 1] ?? 0;
    if (share === 0) return [];
    const areaM2 = parts[code - 1]?.areaM2 ?? 0;
    const { best, unit } = areaFigures({ least: areaM2, best: areaM2, most: areaM2 });
    const span = openEnded ? `over ${minUm}` : `${minUm} to ${maxUm}`;
    return [
      html`<tr><th scope="row">${code} ${name}</th><td>${span}</td><td>${percentWords(share).replace(' percent', ' %')}</td><td>${best} ${unit.symbol}</td></tr>`,
    ];
  });
  return html`<table>
<caption>Appearance code</caption>
<thead><tr><th scope="col">Code</th><th scope="col">µm</th><th scope="col">Share of the oil</th><th scope="col">Area</th></tr></thead>
<tbody>${rows}</tbody>
</table>`;
}

function thicknessLine({ summary, byThickness }: RecordedResult): SafeHtml | null {
  if (!summary?.quantilesNm) return null;
  const { p05, p50, p95 } = thicknessQuantiles(summary.quantilesNm);
  const nm = (value: number) => value.toLocaleString('en-GB');
  const mean = byThickness?.meanThicknessNm;
  return html`<p>Thickness: nine tenths of the pixels lie between ${p05} and ${p95} nm, the median is ${p50} nm${mean == null ? '' : `; the mean over the oiled area is ${nm(Math.round(mean))} nm`}. Colour can tell up to about ${nm(10 * Math.round(summary.resolvableNm.toNm / 10))} nm here.</p>`;
}

function drainageTable({ law, parameters, rootMeanSquareNm }: RecordedResult['drainage'][number]): SafeHtml {
  return html`<table>
<caption>Drainage law: ${law}, residual ${rootMeanSquareNm.toPrecision(3)} nm</caption>
<thead><tr><th scope="col">Parameter</th><th scope="col">Value</th><th scope="col">Standard deviation</th><th scope="col">Unit</th></tr></thead>
<tbody>${parameters.map(({ name, unit, value, sd }) => html`<tr><th scope="row">${name}</th><td>${value.toPrecision(4)}</td><td>${sd === null ? '–' : sd.toPrecision(2)}</td><td>${unit}</td></tr>`)}</tbody>
</table>`;
}
