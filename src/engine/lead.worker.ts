/** Holds the open photo; calibrates, settles orders, answers probes. */

import type { ActivityMap } from '../match/activity.ts';
import { fillCandidates, type MapRows, type SettledField } from '../match/mapPixels.ts';
import type { PixelReader } from '../match/pixelReader.ts';
import type { ThicknessMap } from '../match/types.ts';
import { decodePhoto } from '../photo/decode.browser.ts';
import type { DecodedPhoto } from '../photo/types.ts';
import { type Band, bandsOf, bandTask } from './bands.ts';
import type { Calibration } from './calibrate.ts';
import { chartFor } from './chartFor.ts';
import { joinBands, readBand, settle } from './estimate.ts';
import type { BandTask, LeadJobs } from './jobs.ts';
import { type KeptFit, keepFit } from './keptFit.ts';
import { leftOutOf } from './leftOut.ts';
import { measureTarget } from './measureTarget.ts';
import { photoViewOf, withPhotoFocal } from './photoView.ts';
import { previewMap } from './previewMap.ts';
import { probePixel } from './probe.ts';
import { buffersIn, serve } from './serve.worker.ts';
import type { Setup } from './setup.ts';
import { changeBetween } from './setupChanges.ts';
import { summarise } from './summarise.ts';
import { tallyPhoto } from './tally.ts';
import { type TallyFacts, tallyFactsOf } from './tallyFacts.ts';

interface Measured {
  readonly setup: Setup;
  readonly tallyFacts: TallyFacts;
  readonly calibration: Calibration;
  readonly reader: PixelReader;
  readonly settled: SettledField;
  readonly bands: readonly Band[];
  readonly activity: ActivityMap;
  readonly own: BandTask;
  ownRows: MapRows | null;
  /** What the page got, kept for the tally; the order has no part in it and is left empty. */
  map: ThicknessMap | null;
  readonly startedAt: number;
  readonly timingsMs: Record<string, number>;
}

let photo: DecodedPhoto | null = null;
let measured: Measured | null = null;
/** Stands until another photo is opened: pins, trend and brush cost no second fit. */
let kept: KeptFit | null = null;

function openPixels(): DecodedPhoto['pixels'] {
  if (!photo) throw new Error('Open a photo first.');
  return photo.pixels;
}

/** Drops the rows that a band read only for its neighbours' sake. */
function cut(rows: MapRows, band: Band, width: number): MapRows {
  const from = band.lead * width;
  if (from === 0) return rows;
  return {
    fromRow: band.fromRow,
    toRow: band.toRow,
    thicknessNm: rows.thicknessNm.subarray(from),
    lowNm: rows.lowNm.subarray(from),
    highNm: rows.highNm.subarray(from),
    order: rows.order.subarray(from),
    status: rows.status.subarray(from),
  };
}

serve<LeadJobs>(
  {
    openPhoto: async ({ file, fileName }, onProgress) => {
      measured = null;
      kept = null;
      photo = await decodePhoto(file as Blob, fileName, { onProgress });
      const { pixels, metadata, scale, notices } = photo;
      return { width: pixels.width, height: pixels.height, scale, metadata, notices };
    },
    prepare: ({ setup: stated, bands: wanted }, onProgress) => {
      const pixels = openPixels();
      const setup = photo ? withPhotoFocal(stated, photo.metadata) : stated;
      const startedAt = performance.now();
      kept = keepFit(pixels, setup, kept, (share, step) => onProgress(share * 0.45, step));
      const { leftOut, activity, calibration, reader, field } = kept;
      const calibrated = performance.now();
      onProgress(0.45, 'matching colours');
      fillCandidates(pixels, reader, calibration.rules, leftOut, field, 0, field.height);
      const matched = performance.now();
      const settled = settle(field, setup, calibration, (share) =>
        onProgress(0.55 + 0.15 * share, 'settling orders'),
      );
      const ordered = performance.now();
      const bands = bandsOf(pixels.height, settled.spacing, wanted);
      const tasks = bands.map((band) => bandTask(pixels, calibration, leftOut, settled, band));
      const timingsMs = {
        calibrate: calibrated - startedAt,
        match: matched - calibrated,
        orders: ordered - matched,
      };
      measured = {
        setup,
        tallyFacts: tallyFactsOf(calibration, leftOut),
        calibration,
        reader,
        settled,
        bands,
        activity,
        own: tasks[0]!,
        ownRows: null,
        map: null,
        startedAt,
        timingsMs,
      };
      // Charts are needed here too; the rest of a task is a copy already.
      return {
        others: tasks.slice(1).map((task) => ({
          ...task,
          charts: structuredClone(task.charts),
          angles: structuredClone(task.angles),
        })),
      };
    },
    preview: ({ setup: stated }) => {
      if (!photo || !kept) return null;
      const { pixels, metadata } = photo;
      const setup = withPhotoFocal(stated, metadata);
      const change = changeBetween(kept.setup, setup);
      if (change === 'all') return null;
      const { reader, calibration, field } = kept;
      const leftOut = change === 'mask' ? leftOutOf(pixels, setup, kept.texture) : kept.leftOut;
      fillCandidates(pixels, reader, calibration.rules, leftOut, field, 0, field.height);
      return previewMap(field, setup, calibration, leftOut, pixels.width, pixels.height);
    },
    readOwn: (_, onProgress) => {
      if (!measured) throw new Error('Prepare the map first.');
      onProgress(0.75, 'reading every pixel');
      measured.ownRows = readBand(measured.own);
      return null;
    },
    finish: ({ bands: others }) => {
      const pixels = openPixels();
      if (!measured?.ownRows) throw new Error('Read the map first.');
      const { calibration, bands, startedAt, timingsMs } = measured;
      const all = [measured.ownRows, ...others].map((rows, k) => cut(rows, bands[k]!, pixels.width));
      measured.ownRows = null;
      const map = joinBands(pixels.width, pixels.height, all);
      // The map itself is handed over to the page.
      measured.map = {
        ...map,
        thicknessNm: map.thicknessNm.slice(),
        lowNm: map.lowNm.slice(),
        highNm: map.highNm.slice(),
        order: new Uint8Array(0),
        status: map.status.slice(),
      };
      return {
        map,
        summary: summarise(map, calibration, { ...timingsMs, total: performance.now() - startedAt }),
        camera: calibration.camera,
      };
    },
    tally: ({ setup: changed, ...options }) => {
      if (!photo || !measured?.map) return null;
      const { map, tallyFacts } = measured;
      const { metadata } = photo;
      const setup = changed ? withPhotoFocal(changed, metadata) : measured.setup;
      const view = photoViewOf(setup, map.width, map.height);
      return tallyPhoto(map, setup, view, options, { ...tallyFacts, metadata });
    },
    probe: ({ x, y }) => {
      if (!photo || !measured) return null;
      const { calibration, reader, activity, settled } = measured;
      const found = probePixel(photo.pixels, calibration, reader, activity, settled, x, y);
      return (
        found && {
          ...found,
          status: 0,
          mapThicknessNm: Number.NaN,
          mapLowNm: Number.NaN,
          mapHighNm: Number.NaN,
        }
      );
    },
    target: ({ corners, light }) => measureTarget(openPixels(), corners, light),
    chart: ({ setup, maxThicknessNm }) => chartFor(setup, maxThicknessNm),
  },
  buffersIn,
);
