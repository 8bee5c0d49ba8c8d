import { APPEARANCE_CODE_SCOPE } from '../tally/appearanceCode.ts';
import { SAFETY_CAUTIONS, USE_CAUTIONS } from '../tally/cautions.ts';
import { filmName } from './filmWords.ts';
import { type HtmlPart, html, SafeHtml } from './html.ts';
import { conditionWords, positionWords, sourceWords, timeWords, viewpointWords } from './inWords.ts';
import { legendSvg } from './legendSvg.ts';
import type { Observation } from './observation.ts';
import { REPORT_CSS } from './reportStyle.ts';
import { amountTables } from './reportTables.ts';

export interface ReportPicture {
  /** A data or blob URL of the map picture: a report asks nothing of any network. */
  readonly url: string;
  /** Thickness at the light end of the map's ramp, nm; for the legend. */
  readonly topNm: number;
}

export interface ReportOptions {
  readonly picture?: ReportPicture | null;
}

const BENCH_CAUTION =
  'Thickness from a photo is indicative: state the set-up and the intervals with every figure.';

/**
 * One observation as one page, as markup for a page that has `REPORT_CSS` in force. All texts are escaped.
 * @throws RangeError where the picture is not a data or blob URL
 */
export function reportMarkup(observation: Observation, options: ReportOptions = {}): SafeHtml {
  const { result } = observation;
  const isBench = observation.viewpoint.from === 'bench';
  return html`<article class="report">
<header>
<p class="report-kind">Indicative report of a ${isBench ? 'liquid film' : 'film on water'}${observation.photo && ', from the colours in a photo'}</p>
<h1>${observation.title || 'Untitled observation'}</h1>
</header>
<div class="report-columns">
${picture(observation, options)}
${amountTables(observation)}
<section><h2>Record</h2>${pairs(recordPairs(observation))}</section>
<section><h2>Conditions</h2>${list(conditionWords(observation.conditions), 'None noted.')}</section>
<section><h2>Not known</h2>${list(observation.notKnown, 'Nothing that is usually recorded is missing.')}</section>
${result && result.reasons.length > 0 && html`<section><h2>Why the two methods differ</h2>${list(result.reasons.map(({ text }) => text))}</section>`}
</div>
${observation.remarks !== '' && html`<section><h2>Remarks</h2><p class="report-remarks">${observation.remarks}</p></section>`}
<section class="report-cautions"><h2>Cautions</h2>${list([
    ...readingNotices(observation),
    ...(isBench ? [BENCH_CAUTION] : [...USE_CAUTIONS, ...SAFETY_CAUTIONS].map(({ text }) => text)),
  ])}</section>
${footer(observation)}
</article>`;
}

/** What the reading and the tally said, each once; the scope of the code stands below its table already. */
function readingNotices({ result, viewpoint }: Observation): string[] {
  const texts = [...(result?.summary?.notices ?? []), ...(result?.notices ?? [])].map(({ text }) => text);
  const saidBelowTable = result?.byCode && viewpoint.from !== 'aircraft';
  return [...new Set(texts)].filter((text) => !saidBelowTable || text !== APPEARANCE_CODE_SCOPE);
}

/** The same as a whole document with its style, for a file that opens anywhere. */
export function reportDocument(observation: Observation, options: ReportOptions = {}): string {
  const page = html`<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width">
<title>${observation.title || 'Observation'}</title>
<style>${new SafeHtml(REPORT_CSS)}</style>
</head>
<body>
${reportMarkup(observation, options)}
</body>
</html>
`;
  return page.text;
}

function picture({ photo, result }: Observation, { picture: given }: ReportOptions): SafeHtml {
  if (!given) {
    return html`<p class="report-none">${photo ? 'No map is in this record.' : 'Observed without a photo.'}</p>`;
  }
  if (!/^(data:image\/(png|jpeg);base64,[A-Za-z0-9+/=]+|blob:[^\s"<>]+)$/.test(given.url)) {
    throw new RangeError('The picture of a report must be a data or blob URL of a PNG or JPEG.');
  }
  const calibrated = result?.summary?.calibrated === false ? ' Not calibrated: no reference was marked.' : '';
  return html`<figure><img src="${given.url}" alt="Map of film thickness"><figcaption>Film thickness.${calibrated}</figcaption>${legendSvg(given.topNm)}</figure>`;
}

function recordPairs(o: Observation): readonly (readonly [string, HtmlPart])[] {
  const { time, position, observer, substance, setup } = o;
  const lensNotes = o.viewpoint.heightM ? ` (height ${sourceWords(o.viewpoint.heightM.source)})` : '';
  return [
    ['Time', time && `${timeWords(time)}, ${sourceWords(time.source)}`],
    ['Clock', time && time.utc !== time.recorded && time.recorded],
    [
      'Position',
      position
        ? `${positionWords(position)} (WGS 84), ${sourceWords(position.source)}${position.errorM === undefined ? '' : `, ± ${Math.round(position.errorM)} m`}`
        : o.leftOut.includes('position') && 'left out on purpose',
    ],
    ['Place', o.placeName],
    ['Seen', `${viewpointWords(o.viewpoint)}${lensNotes}`],
    ['Observer', [observer.role, observer.organisation, observer.platform].filter(Boolean).join(', ')],
    ['Incident', observer.incident],
    ['Oil type', substance && `${substance.name}${substance.howKnown ? `, ${substance.howKnown}` : ''}`],
    ['Read as', setup && filmName(setup.film)],
    ['Look-alikes', o.lookAlikes?.reason],
    ['Camera fit', o.result?.summary?.fit?.advice],
    [
      'Told',
      o.toldTo.map(({ who, utc, reference }) => [who, utc, reference].filter(Boolean).join(', ')).join('; '),
    ],
  ];
}

function footer({ photo, leftOut, madeWith, id, changedUtc, result }: Observation): SafeHtml {
  const original = photo && {
    name: photo.metadata.fileName,
    size: `${photo.metadata.byteLength.toLocaleString('en-GB')} bytes, ${photo.metadata.originalWidth} × ${photo.metadata.originalHeight} pixels`,
    kept: leftOut.includes('original') ? 'left out of this record' : 'kept unedited with this record',
  };
  return html`<footer>
${original && html`<p>Original photo ${original.name} (${original.size}), ${original.kept}. SHA-256 <code>${photo.metadata.sha256}</code></p>`}
<p>Record ${id}, changed ${changedUtc}. Tintfathom ${madeWith.app}, model ${madeWith.model}. ${result?.byCode?.version ?? ''}</p>
</footer>`;
}

function pairs(entries: readonly (readonly [string, HtmlPart])[]): SafeHtml {
  const known = entries.filter(([, value]) => value);
  return html`<dl>${known.map(([name, value]) => html`<dt>${name}</dt><dd>${value}</dd>`)}</dl>`;
}

function list(texts: readonly string[], none = ''): SafeHtml {
  return texts.length > 0
    ? html`<ul>${texts.map((text) => html`<li>${text}</li>`)}</ul>`
    : html`<p>${none}</p>`;
}
