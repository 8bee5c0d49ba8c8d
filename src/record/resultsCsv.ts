import { APPEARANCES } from '../tally/appearanceCode.ts';
import { type CsvValue, writeCsv } from './csv.ts';
import type { Observation, RecordedResult, Sourced } from './observation.ts';

export const RESULT_HEADER = ['group', 'quantity', 'value', 'low', 'high', 'unit', 'source_or_method'];
export type ResultRow = readonly [string, string, CsvValue, CsvValue, CsvValue, string, string];

/**
 * The observation and its results as one table, a quantity a row, for spreadsheets and scripts. Values stand unrounded in
 * SI units, but for what is known to a tenth at best; low and high are the ends of the 90 % interval, or least and most by the code. What was not known has
 * no row of its own but is listed at the end.
 */
export function resultsCsv(observation: Observation): string {
  return writeCsv(RESULT_HEADER, [
    ...recordRows(observation),
    ...viewRows(observation),
    ...(observation.result ? resultRows(observation.result) : []),
    ...observation.notKnown.map((text): ResultRow => ['not_known', '', text, null, null, '', '']),
  ]);
}

const text = (group: string, quantity: string, value: string | undefined | null, source = ''): ResultRow[] =>
  value ? [[group, quantity, value, null, null, '', source]] : [];
const figure = (
  group: string,
  quantity: string,
  value: number | undefined | null,
  unit: string,
  source = '',
): ResultRow[] => (value == null ? [] : [[group, quantity, value, null, null, unit, source]]);
const sourced = (
  group: string,
  quantity: string,
  of: Sourced<number> | undefined,
  unit: string,
): ResultRow[] => figure(group, quantity, of?.value, unit, of?.source);

/** Of what is known no better: the sun's place, and the ends of what colour can tell. */
const tenth = <T extends number | undefined>(value: T) =>
  (value === undefined ? value : Math.round(10 * value) / 10) as T;

function recordRows({ time, position, ...o }: Observation): ResultRow[] {
  return [
    ...text('record', 'title', o.title),
    ...text('record', 'id', o.id),
    ...text('record', 'app_version', o.madeWith.app),
    ...text('record', 'model_version', o.madeWith.model),
    ...text('record', 'role', o.observer.role),
    ...text('record', 'organisation', o.observer.organisation),
    ...text('record', 'platform', o.observer.platform),
    ...text('record', 'incident', o.observer.incident),
    ...text('record', 'time_utc', time?.utc, time?.source),
    ...text('record', 'time_as_recorded', time?.recorded, time?.source),
    ...text('record', 'place', o.placeName),
    ...figure('record', 'latitude', position?.latitudeDeg, 'deg', position?.source),
    ...figure('record', 'longitude', position?.longitudeDeg, 'deg', position?.source),
    ...figure('record', 'position_error', position?.errorM, 'm', position?.source),
    ...text('record', 'oil_type', o.substance?.name, o.substance?.howKnown),
    ...text('record', 'look_alikes', o.lookAlikes?.conclusion, o.lookAlikes?.reason),
    ...text('record', 'photo_file', o.photo?.metadata.fileName),
    ...text('record', 'photo_sha256', o.photo?.metadata.sha256),
    ...text('record', 'remarks', o.remarks),
  ];
}

function viewRows({ viewpoint, conditions }: Observation): ResultRow[] {
  const sun = conditions.sun;
  return [
    ...text('view', 'viewpoint', viewpoint.from),
    ...sourced('view', 'height', viewpoint.heightM, 'm'),
    ...sourced('view', `heading_${viewpoint.headingReference ?? 'unknown'}`, viewpoint.headingDeg, 'deg'),
    ...sourced('view', 'pitch', viewpoint.pitchDeg, 'deg'),
    ...sourced('view', 'roll', viewpoint.rollDeg, 'deg'),
    ...sourced('view', 'focal_length_35mm', viewpoint.focalLength35mm, 'mm'),
    ...figure('conditions', 'wind_speed', conditions.windMS, 'm/s'),
    ...figure('conditions', 'wind_from', conditions.windFromDeg, 'deg'),
    ...figure('conditions', 'sea_state_wmo_3700', conditions.seaState, ''),
    ...figure('conditions', 'wave_height', conditions.waveHeightM, 'm'),
    ...text('conditions', 'sky', conditions.sky),
    ...figure('conditions', 'sun_elevation', tenth(sun?.value.elevationDeg), 'deg', sun?.source),
    ...figure('conditions', 'sun_azimuth', tenth(sun?.value.azimuthDeg), 'deg', sun?.source),
    ...figure('conditions', 'visibility', conditions.visibilityKm, 'km'),
    ...figure('conditions', 'air_temperature', conditions.airTemperatureC, 'degC'),
    ...figure('conditions', 'water_temperature', conditions.waterTemperatureC, 'degC'),
    ...text('conditions', 'polariser', conditions.polariser),
    ...text('conditions', 'water', conditions.waterRemarks),
  ];
}

/** What was worked out, a quantity a row; nothing for what was not. */
export function resultRows({ summary, area, byThickness, byCode, drainage }: RecordedResult): ResultRow[] {
  const rows: ResultRow[] = [];
  if (summary) {
    const { quantilesNm: q, resolvableNm, counts } = summary;
    if (q)
      rows.push(['thickness', 'median', q.p50, q.p05, q.p95, 'nm', 'low and high: 5 % and 95 % of pixels']);
    rows.push([
      'thickness',
      'resolvable',
      null,
      tenth(resolvableNm.fromNm),
      tenth(resolvableNm.toNm),
      'nm',
      '',
    ]);
    for (const [name, count] of Object.entries(counts)) {
      rows.push(['pixels', name, count, null, null, '1', '']);
    }
    rows.push(...text('thickness', 'calibrated', summary.calibrated ? 'yes' : 'no', summary.fit?.determined));
  }
  if (area) {
    rows.push(...figure('area', 'region', area.regionM2, 'm2'));
    rows.push(...figure('area', 'bare', area.bareM2, 'm2'));
    rows.push(...figure('area', 'unread', area.unreadM2, 'm2'));
    rows.push([
      'area',
      'coverage',
      area.coverage,
      area.coverageLeast,
      area.coverageMost,
      '1',
      'low and high: unread water bare or oiled',
    ]);
  }
  if (byThickness) {
    const { oiledM2, volumeM3, inputs } = byThickness;
    const method = `by thickness, ${100 * inputs.coverage} % interval, ${inputs.trials} trials${byThickness.atLeast ? '; at least' : ''}`;
    rows.push(['area', 'oiled', oiledM2.best, oiledM2.least, oiledM2.most, 'm2', method]);
    rows.push(['volume', 'by_thickness', volumeM3.best, volumeM3.least, volumeM3.most, 'm3', method]);
    rows.push([
      'volume',
      'by_thickness',
      1000 * volumeM3.best,
      1000 * volumeM3.least,
      1000 * volumeM3.most,
      'L',
      method,
    ]);
    rows.push(...figure('thickness', 'mean_of_oiled', byThickness.meanThicknessNm, 'nm', method));
  }
  if (byCode) {
    const method = `${byCode.version}${byCode.atLeast ? '; at least' : ''}`;
    rows.push(['volume', 'by_appearance_code', null, byCode.minM3, byCode.maxM3, 'm3', method]);
    rows.push(['volume', 'by_appearance_code', null, 1000 * byCode.minM3, 1000 * byCode.maxM3, 'L', method]);
    rows.push(...figure('area', 'oiled_by_code', byCode.oiledM2, 'm2', method));
    byCode.shares.forEach((share, i) => {
      rows.push(['appearance', `share_code_${i + 1}`, share, null, null, '1', APPEARANCES[i]!.name]);
    });
  }
  for (const { law, parameters, rootMeanSquareNm } of drainage) {
    for (const { name, unit, value, sd } of parameters) {
      const [low, high] = sd === null ? [null, null] : [value - sd, value + sd];
      rows.push([
        'drainage',
        `${law}_${name}`,
        value,
        low,
        high,
        unit,
        'low and high: one standard deviation',
      ]);
    }
    rows.push(['drainage', `${law}_residual`, rootMeanSquareNm, null, null, 'nm', 'root mean square']);
  }
  return rows;
}
