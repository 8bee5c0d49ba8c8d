import type { Notice } from '../view/notice.ts';
import { LIMIT_RAD, viewNotices, WARNING_RAD } from '../view/viewLimits.ts';
import { cosineReader } from '../view/waterFields.ts';
import type { WaterView } from '../view/waterView.ts';
import { LEFT_OUT } from './leftOutMarks.ts';
import type { PhotoView } from './photoView.ts';

/** Marks pixels that look too far to the side, or above the horizon, in place. Other marks stay. */
export function leaveOutSlanted(out: Uint8Array, view: WaterView): void {
  const { widthPx, heightPx } = view.camera;
  const cosineAt = cosineReader(view);
  const least = Math.cos(LIMIT_RAD);
  for (let y = 0, i = 0; y < heightPx; y++) {
    for (let x = 0; x < widthPx; x++, i++) {
      if (out[i] !== LEFT_OUT.no) continue;
      const cosine = cosineAt(x, y);
      if (cosine < least) out[i] = cosine > 0 ? LEFT_OUT.tooSlanted : LEFT_OUT.aboveHorizon;
    }
  }
}

/** What to say about the view: its own notices, and how much of the region is seen too flat. */
export function viewNoticesOf(photoView: PhotoView | null, leftOut: Uint8Array | null): readonly Notice[] {
  if (!photoView) return [];
  const { view } = photoView;
  if (!view || !leftOut) return photoView.notices;
  const { widthPx } = view.camera;
  const cosineAt = cosineReader(view);
  const warned = Math.cos(WARNING_RAD);
  const counts = { good: 0, slanted: 0, tooSlanted: 0, aboveHorizon: 0 };
  let total = 0;
  for (let i = 0; i < leftOut.length; i++) {
    const mark = leftOut[i]!;
    if (mark === LEFT_OUT.outsideRegion) continue;
    total++;
    if (mark === LEFT_OUT.tooSlanted) counts.tooSlanted++;
    else if (mark === LEFT_OUT.aboveHorizon) counts.aboveHorizon++;
    else if (cosineAt(i % widthPx, Math.floor(i / widthPx)) >= warned) counts.good++;
    else counts.slanted++;
  }
  if (total === 0) return photoView.notices;
  const share = (count: number) => count / total;
  return [
    ...photoView.notices,
    ...viewNotices({
      good: share(counts.good),
      slanted: share(counts.slanted),
      tooSlanted: share(counts.tooSlanted),
      aboveHorizon: share(counts.aboveHorizon),
    }),
  ];
}
