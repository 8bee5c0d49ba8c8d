import { useEffect, useState } from 'preact/hooks';
import type { Observation } from '../../record/observation.ts';
import { Icon } from '../parts/Icon.tsx';
import { theStore } from './desk.ts';

/** The record's small photo, or a sign that there is none. */
export function Thumbnail({ observation }: { readonly observation: Observation }) {
  const file = observation.files.find(({ role }) => role === 'thumbnail');
  const url = useFileUrl(file?.sha256 ?? null, file?.mediaType ?? '');
  return url ? (
    <img class="thumbnail" src={url} alt="" />
  ) : (
    <span class="thumbnail">{file ? null : <Icon name="map" />}</span>
  );
}

/** A blob URL of a kept file, null until it is read or where it is not here. */
function useFileUrl(sha256: string | null, mediaType: string): string | null {
  const [url, setUrl] = useState<string | null>(null);
  useEffect(() => {
    let made: string | null = null;
    let stale = false;
    if (sha256)
      void theStore()
        .then((store) => store.file(sha256))
        .then((bytes) => {
          if (stale || !bytes) return;
          made = URL.createObjectURL(new Blob([bytes as Uint8Array<ArrayBuffer>], { type: mediaType }));
          setUrl(made);
        })
        .catch(() => null);
    return () => {
      stale = true;
      if (made) URL.revokeObjectURL(made);
    };
  }, [sha256, mediaType]);
  return url;
}
