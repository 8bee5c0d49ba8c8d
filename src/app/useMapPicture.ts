import { useEffect, useState } from 'preact/hooks';
import type { EstimateResult } from '../engine/contract.ts';
import { type MapPicture, mapPicture } from './mapPicture.ts';

/** The painted map of a result, null until it is painted. */
export function useMapPicture(
  measured: EstimateResult | null,
  view: 'thickness' | 'order',
): MapPicture | null {
  const [picture, setPicture] = useState<MapPicture | null>(null);
  useEffect(() => {
    let stale = false;
    if (!measured) return setPicture(null);
    void mapPicture(measured.map, view).then((painted) => {
      if (stale) painted.bitmap.close();
      else setPicture(painted);
    });
    return () => {
      stale = true;
    };
  }, [measured, view]);
  useEffect(() => () => picture?.bitmap.close(), [picture]);
  return measured ? picture : null;
}
