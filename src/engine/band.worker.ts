/** Reads bands of a photo for the lead. */
import { readBand } from './estimate.ts';
import type { BandJobs } from './jobs.ts';
import { buffersIn, serve } from './serve.worker.ts';

serve<BandJobs>({ readBand: (task) => readBand(task) }, buffersIn);
