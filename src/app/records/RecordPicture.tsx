import { useEffect, useState } from 'preact/hooks';
import { legendSvg } from '../../record/legendSvg.ts';
import type { Observation } from '../../record/observation.ts';
import { theDesk } from './desk.ts';

interface Picture {
  readonly url: string;
  readonly topNm: number;
}

/** The map's picture as a blob URL, null until it is read or where there is none. */
export function useRecordPicture(id: string, hasMap: boolean): Picture | null {
  const [picture, setPicture] = useState<Picture | null>(null);
  useEffect(() => {
    let made: string | null = null;
    let stale = false;
    if (hasMap)
      void theDesk()
        .picture(id)
        .then((found) => {
          if (stale || !found) return;
          made = URL.createObjectURL(found.png);
          setPicture({ url: made, topNm: found.topNm });
        })
        // A record without its picture is still a record.
        .catch(() => null);
    return () => {
      stale = true;
      if (made) URL.revokeObjectURL(made);
    };
  }, [id, hasMap]);
  return picture;
}

export function hasMapPicture({ files }: Observation): boolean {
  return files.some(({ role }) => role === 'mapPicture');
}

/** The map with its legend. */
export function RecordPicture({ observation }: { readonly observation: Observation }) {
  const hasMap = hasMapPicture(observation);
  const picture = useRecordPicture(observation.id, hasMap);
  if (!hasMap) return null;
  return (
    <figure class="record-picture">
      {picture ? (
        <>
          <img src={picture.url} alt="Map of film thickness" />
          {/* Safe by type: our own markup, in which every text was escaped. */}
          <div class="legend-box" dangerouslySetInnerHTML={{ __html: legendSvg(picture.topNm).text }} />
        </>
      ) : null}
    </figure>
  );
}
