import type { TallyReport } from '../engine/tallyContract.ts';
import { APPEARANCES } from '../tally/appearanceCode.ts';
import { writeCsv } from './csv.ts';
import { recordResult } from './recordResult.ts';
import { RESULT_HEADER, type ResultRow, resultRows } from './resultsCsv.ts';

/**
 * A tally as one table in the form of `resultsCsv`: areas, coverage, shares, both volumes, the view, the histogram of
 * thickness and all notices. Without a scale there are shares by pixel count and no areas.
 */
export function tallyCsv(report: TallyReport): string {
  const inMetres = report.scale === 'metres';
  return writeCsv(RESULT_HEADER, [
    ['tally', 'scale', report.scale, null, null, '', inMetres ? 'shares by area' : 'shares by pixel count'],
    ...(inMetres ? resultRows(recordResult(report)) : unscaledRows(report)),
    ...partRows(report),
    ...viewRows(report),
    ...histogramRows(report),
    ...report.notices.map(({ code, text }): ResultRow => ['notice', code, text, null, null, '', '']),
  ]);
}

function unscaledRows({ coverage, shares }: TallyReport): ResultRow[] {
  return [
    [
      'area',
      'coverage',
      coverage.share,
      coverage.least,
      coverage.most,
      '1',
      'low and high: unread water bare or oiled',
    ],
    ...(shares.used ?? []).map(
      (share, i): ResultRow => [
        'appearance',
        `share_code_${i + 1}`,
        share,
        null,
        null,
        '1',
        APPEARANCES[i]!.name,
      ],
    ),
  ];
}

function partRows({
  regionShares,
  atLeastShare,
  ambiguousShare,
  shares,
  countedPixels,
}: TallyReport): ResultRow[] {
  const share = (group: string, quantity: string, value: number, of: string): ResultRow => [
    group,
    quantity,
    value,
    null,
    null,
    '1',
    of,
  ];
  return [
    share('region', 'share_oiled', regionShares.oiled, 'of the region'),
    share('region', 'share_bare', regionShares.bare, 'of the region'),
    share('region', 'share_unread', regionShares.unread, 'of the region'),
    share('region', 'share_past_colour', atLeastShare, 'of the oiled area'),
    share('region', 'share_ambiguous', ambiguousShare, 'of the oiled area'),
    share('region', 'counted_pixels', countedPixels, ''),
    ['appearance', 'shares_from', shares.from, null, null, '', ''],
  ];
}

function viewRows({
  scale,
  incidenceDeg,
  excludedShare,
  lengthCheck,
  sun,
  headingDeg,
  position,
}: TallyReport): ResultRow[] {
  const rows: ResultRow[] = [];
  const figure = (quantity: string, value: number | null, unit: string, method = '') => {
    if (value !== null) rows.push(['view', quantity, value, null, null, unit, method]);
  };
  if (scale === 'metres') {
    if (incidenceDeg) {
      const { least, most } = incidenceDeg;
      rows.push(['view', 'incidence', null, least, most, 'deg', 'from the vertical, pixels that count']);
    }
    figure('excluded_share', excludedShare, '1', 'of the region: beyond 75 degrees or above the horizon');
    figure('known_length_stated', lengthCheck?.statedM ?? null, 'm');
    figure('known_length_measured', lengthCheck?.measuredM ?? null, 'm');
  }
  figure('heading_true', headingDeg, 'deg');
  figure('latitude', position?.latitudeDeg ?? null, 'deg');
  figure('longitude', position?.longitudeDeg ?? null, 'deg');
  figure('sun_elevation', sun?.elevationDeg ?? null, 'deg', 'computed');
  figure('sun_azimuth', sun?.azimuthDeg ?? null, 'deg', 'computed');
  return rows;
}

/** One row a bin that holds film, its ends in the name; the last bin holds all that is thicker. */
function histogramRows({ histogram, area }: TallyReport): ResultRow[] {
  const { stepNm, share } = histogram;
  const last = share.length - 1;
  return [...share].flatMap((value, i): ResultRow[] => {
    if (value === 0) return [];
    const name = i === last ? `film_from_${i * stepNm}_nm` : `film_${i * stepNm}_to_${(i + 1) * stepNm}_nm`;
    return [
      area
        ? ['histogram', name, area.histogram.areaM2[i]!, null, null, 'm2', 'area of film with a thickness']
        : ['histogram', name, value, null, null, '1', 'of the film with a thickness'],
    ];
  });
}
