import { expect, test } from 'vitest';
import {
  codeVolumeFigures,
  percentWords,
  plural,
  positionWords,
  timeWords,
  volumeFigures,
} from '../../src/record/inWords.ts';
import { messageText } from '../../src/record/messageText.ts';
import { reportDocument } from '../../src/record/report.ts';
import { resultsCsv } from '../../src/record/resultsCsv.ts';
import { notebookObservation, quayObservation } from './sample.ts';

test('positions in degrees and minutes, the carry of 60 minutes too', () => {
  const words = (latitudeDeg: number, longitudeDeg: number) =>
    positionWords({ latitudeDeg, longitudeDeg, source: 'typed' });
  // 47.251° = 47° 15.06'; 21.403° = 21° 24.18'.
  expect(words(47.251, -21.403)).toBe('47 degrees 15.06 minutes north, 21 degrees 24.18 minutes west');
  expect(words(-0.5, 9.999999)).toBe('0 degrees 30.00 minutes south, 10 degrees 0.00 minutes east');
});

test('a time of unknown offset is never called UTC', () => {
  const known = {
    utc: '2025-05-14T11:32:07Z',
    recorded: '',
    offset: 'Z',
    source: 'exif',
    offsetSource: 'exif',
  } as const;
  expect(timeWords(known)).toBe('14 May 2025, 11:32 UTC');
  expect(timeWords({ ...known, utc: null, recorded: '2025-05-14T10:32:07', offset: null })).toBe(
    '14 May 2025, 10:32 by a clock of unknown offset',
  );
});

test('volumes in the unit that reads, no more digits than the interval allows, ends rounded outwards', () => {
  const figures = volumeFigures({ least: 6.13e-5, best: 8.44e-5, most: 1.151e-4 });
  expect([figures.least, figures.best, figures.most, figures.unit.id]).toEqual(['61', '84', '116', 'mL']);
  const code = codeVolumeFigures(1.245e-5, 2.075e-4);
  expect([code.least, code.most, code.unit.id]).toEqual(['12', '210', 'mL']);
});

test('units agree with their figure', () => {
  expect(['1', '1.0', '0.5', '2'].map((n) => plural('litre', n))).toEqual([
    'litre',
    'litre',
    'litres',
    'litres',
  ]);
  expect(plural('barrel (42 US gallons)', 3)).toBe('barrels (42 US gallons)');
  expect(plural('foot', 2)).toBe('feet');
});

test('something is never 0 percent', () => {
  expect([0, 0.002, 0.426, 1].map(percentWords)).toEqual([
    '0 percent',
    'under 1 percent',
    '43 percent',
    '100 percent',
  ]);
});

test('the message of a full record', () => {
  expect(messageText(quayObservation()).split('\n')).toEqual([
    'Film on water, indicative report. Sheen at the inner quay, "north" end.',
    'Seen 14 May 2025, 11:32 UTC.',
    'Position 47 degrees 15.06 minutes north, 21 degrees 24.18 minutes west, Inner quay.',
    'Seen from the shore, 3.2 metres above the water, looking along 214.5 degrees true.',
    'Oil type: diesel.',
    'Oiled area 370 to 470 square metres, best 420; 68 percent of the water is oiled.',
    'Volume by thickness at least 61 to 115 millilitres, best 84.',
    'Volume by appearance code 49 to 710 millilitres.',
    'Wind 3 metres per second from 240 degrees, sea state 1 (calm, rippled), overcast, sun 52 degrees high, bearing 142 degrees, no polariser, greenish, a little foam.',
    quayObservation().lookAlikes?.reason,
    'Not known: who has been told.',
    'Figures are indicative; the responsible authority decides.',
  ]);
});

test('the message of a notebook says what is missing, and nothing that is not there', () => {
  const message = messageText(notebookObservation());
  expect(message).toContain('Time not known.\nPosition not known.');
  expect(message).toContain('By eye 2000 metres long, 300 metres wide, 40 percent of that oiled.');
  expect(message).toMatch(/Not known: .*; and \d+ more\./);
  expect(message).not.toMatch(/undefined|null|NaN/);
  // 240,000 m² of 90 % sheen and 10 % rainbow: 0.9 · 0.04 + 0.1 · 0.3 = 0.066 µm; 0.9 · 0.3 + 0.1 · 5 = 0.77 µm.
  expect(message).toContain('Volume by appearance code 16 to 180 litres.');
});

test('the message of a soap film speaks of no water and no oil, but of its thickness', () => {
  const quay = quayObservation();
  const summary = quay.result!.summary!;
  const message = messageText({
    ...quay,
    viewpoint: { from: 'bench' },
    result: {
      ...quay.result!,
      byThickness: null,
      byCode: null,
      summary: { ...summary, quantilesNm: { ...summary.quantilesNm!, p05: 14.2, p50: 511.4, p95: 1014 } },
    },
  });
  expect(message).not.toMatch(/[Ww]ater[,. ]|[Oo]il|responsible/);
  expect(message).toContain('Thickness: median 510 nanometres, nine tenths of the pixels from 10 to 1,010.');
});

test('without a scale the message still says how much of what was read is film', () => {
  const quay = quayObservation();
  const counts = { ...quay.result!.summary!.counts, measured: 60, ambiguous: 7, atLeast: 0, bare: 33 };
  const message = messageText({
    ...quay,
    substance: null,
    result: {
      ...quay.result!,
      area: null,
      byThickness: null,
      byCode: null,
      summary: { ...quay.result!.summary!, counts },
    },
  });
  expect(message).toContain('Amount not known.\nFilm on 67 percent of the part of the photo that was read.');
});

test('a position that was left out is called that', () => {
  const message = messageText({ ...quayObservation(), position: null, leftOut: ['position'] });
  expect(message).toContain('Position left out.');
  expect(message).not.toContain('Inner quay.');
});

test('the table of results: every row as wide as the header, figures unrounded in SI units', () => {
  const lines = resultsCsv(quayObservation()).split('\r\n');
  expect(lines[0]).toBe('group,quantity,value,low,high,unit,source_or_method');
  expect(lines.find((line) => line.startsWith('volume,by_thickness') && line.includes(',m3,'))).toMatch(
    /^volume,by_thickness,0\.000084,0\.000061,0\.000115,m3,"by thickness, 90 % interval/,
  );
  expect(lines).toContain('record,latitude,47.251,,,deg,exif');
  expect(lines).toContain('not_known,,Who has been told.,,,,');
});

test('no oil, and no answer, are said as such and never as a nought', () => {
  const { result, ...rest } = quayObservation();
  const none = { least: 0, best: 0, most: 0 };
  const empty = {
    ...result!,
    byThickness: { ...result!.byThickness!, volumeM3: none, oiledM2: none, meanThicknessNm: null },
    byCode: null,
  };
  const bare = { ...rest, result: { ...empty, area: { ...result!.area!, coverage: 0 } } };
  expect(messageText(bare)).toContain('No oil was read on the water that was looked at.');
  expect(messageText(bare)).not.toMatch(/0 to 0/);
  const unread = { ...rest, result: { ...empty, area: { ...result!.area!, coverage: null } } };
  expect(messageText(unread)).toContain('none of the water that was looked at gave an answer.');
  expect(reportDocument(unread)).toContain('none of the water that was looked at gave an answer.');
  expect(reportDocument(unread)).not.toContain('<caption>Area</caption>');
});
