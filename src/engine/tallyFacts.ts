import { LEFT_OUT } from './leftOut.ts';

/** Part of the region's pixels that are clipped (or a marked card), from the bytes of `leftOutOf`. */
export function clippedShareOf(leftOut: Uint8Array): number {
  let inRegion = 0;
  let clipped = 0;
  for (let i = 0; i < leftOut.length; i++) {
    if (leftOut[i] !== LEFT_OUT.outsideRegion) inRegion++;
    if (leftOut[i] === LEFT_OUT.noColour) clipped++;
  }
  return inRegion > 0 ? clipped / inRegion : 0;
}
