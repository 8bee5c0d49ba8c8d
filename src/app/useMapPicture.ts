import { useEffect, useState } from 'preact/hooks';
import type { ThicknessMap } from '../match/types.ts';
import { type MapPicture, mapPicture } from './mapPicture.ts';

/** A map painted for the stage: null until it is painted; while another is being painted the last one stays. */
export function useMapPicture(map: ThicknessMap | null, view: 'thickness' | 'order'): MapPicture | null {
  const [picture, setPicture] = useState<MapPicture | null>(null);
  useEffect(() => {
    let stale = false;
    if (!map) return setPicture(null);
    void mapPicture(map, view).then((painted) => {
      if (stale) painted.bitmap.close();
      else setPicture(painted);
    });
    return () => {
      stale = true;
    };
  }, [map, view]);
  useEffect(() => () => picture?.bitmap.close(), [picture]);
  return map ? picture : null;
}
