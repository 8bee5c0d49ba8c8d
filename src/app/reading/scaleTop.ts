import type { Probe } from '../../engine/contract.ts';

/** Share from which another way of reading a colour must be on the scale. */
const WORTH_SHOWING = 0.01;
const STEP_NM = 50;

/** End of the scale, nm: the map's own, or further where a reading of the probe lies beyond it. */
export function scaleTopNm(mapTopNm: number, probe: Pick<Probe, 'readings'> | null): number {
  const furthest = (probe?.readings ?? [])
    .filter((reading) => reading.share >= WORTH_SHOWING)
    .reduce((most, reading) => Math.max(most, reading.highNm), mapTopNm);
  return furthest <= mapTopNm ? mapTopNm : Math.ceil(furthest / STEP_NM) * STEP_NM;
}
