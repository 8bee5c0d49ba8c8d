import { type Caller, jobOf, makeCaller } from './caller.client.ts';
import type { EstimateResult } from './contract.ts';
import type { Engine } from './engine.client.ts';
import type { BandJobs, LeadJobs } from './jobs.ts';

/** Workers beside the lead: all cores but one, at most three. */
function helpersFor(cores: number): number {
  return Math.max(0, Math.min(cores - 1, 3));
}

const newLead = () =>
  makeCaller<LeadJobs>(
    new Worker(new URL('./lead.worker.ts', import.meta.url), { type: 'module', name: 'lead' }),
  );
const newBand = () =>
  makeCaller<BandJobs>(
    new Worker(new URL('./band.worker.ts', import.meta.url), { type: 'module', name: 'band' }),
  );

/**
 * The engine behind the page: one lead worker that holds the photo, and band workers that read parts of it.
 *
 * Cancelling ends the workers at once. The photo's file is kept, so the next request opens it again unseen.
 */
export function createEngine(): Engine {
  let lead: Caller<LeadJobs> | null = null;
  let helpers: Caller<BandJobs>[] = [];
  let file: { readonly blob: Blob; readonly name: string } | null = null;
  let isOpen = false;
  let last: EstimateResult | null = null;

  const theLead = () => {
    lead ??= newLead();
    return lead;
  };

  function stop(): void {
    lead?.end();
    for (const helper of helpers) helper.end();
    lead = null;
    helpers = [];
    isOpen = false;
  }

  async function reopen(): Promise<void> {
    if (isOpen || !file) return;
    await theLead().call('openPhoto', { file: file.blob, fileName: file.name });
    isOpen = true;
  }

  return {
    openPhoto: (blob, fileName, onProgress) =>
      jobOf(async () => {
        last = null;
        isOpen = false;
        const opened = await theLead().call('openPhoto', { file: blob, fileName }, { onProgress });
        file = { blob, name: fileName };
        isOpen = true;
        return opened;
      }, stop),
    estimate: (setup, onProgress) =>
      jobOf(async () => {
        await reopen();
        const wanted = helpersFor(navigator.hardwareConcurrency || 2) + 1;
        const { others } = await theLead().call('prepare', { setup, bands: wanted }, { onProgress });
        while (helpers.length < others.length) helpers.push(newBand());
        const own = theLead().call('readOwn', null, { onProgress });
        const bands = others.map((task, k) => {
          const { codes } = task.pixels;
          const { thicknessNm, margin } = task.settled;
          const transfer = [
            codes.buffer,
            task.leftOut.buffer,
            thicknessNm.buffer,
            margin.buffer,
          ] as ArrayBuffer[];
          return helpers[k]!.call('readBand', task, { transfer });
        });
        const read = await Promise.all(bands);
        await own;
        const buffers = read.flatMap((band) =>
          [band.thicknessNm, band.lowNm, band.highNm, band.order, band.status].map(
            (part) => part.buffer as ArrayBuffer,
          ),
        );
        last = await theLead().call('finish', { bands: read }, { transfer: buffers });
        onProgress?.(1, 'done');
        return last;
      }, stop),
    preview: async (setup) => (lead && isOpen ? lead.call('preview', { setup }) : null),
    probe: async (x, y) => {
      const at = { x: Math.floor(x), y: Math.floor(y) };
      const probe = lead ? await lead.call('probe', at) : null;
      if (!probe || !last) return probe;
      const { map } = last;
      const i = at.y * map.width + at.x;
      return {
        ...probe,
        status: map.status[i] ?? 0,
        mapThicknessNm: map.thicknessNm[i] ?? Number.NaN,
        mapLowNm: map.lowNm[i] ?? Number.NaN,
        mapHighNm: map.highNm[i] ?? Number.NaN,
      };
    },
    tally: (request = {}) => jobOf(async () => (lead ? lead.call('tally', request) : null), stop),
    target: (corners, light) =>
      jobOf(async () => {
        await reopen();
        return theLead().call('target', { corners, light });
      }, stop),
    chart: (setup, maxThicknessNm) => jobOf(() => theLead().call('chart', { setup, maxThicknessNm }), stop),
    dispose: stop,
  };
}
