import { useEffect, useState } from 'preact/hooks';
import { missingOfView } from '../../engine/partialView.ts';
import type { ExportKind } from '../../engine/recordJobs.ts';
import type { Observation } from '../../record/observation.ts';
import { Icon, type IconName } from '../parts/Icon.tsx';
import { attempt, show, shown } from './desk.ts';
import { handOver, handOverMap, messageOf, printRecord } from './handOverFiles.ts';
import { hasMapPicture, useRecordPicture } from './RecordPicture.tsx';
import { ScreenBar } from './ScreenBar.tsx';

/** Everything a record can be handed over as; one switch leaves the position out of all of it. */
export function HandOverScreen({ id }: { readonly id: string }) {
  useEffect(() => void show(id), [id]);
  const observation = shown.value?.observation.id === id ? shown.value.observation : null;
  return (
    <main class="page records" aria-busy={!observation}>
      <ScreenBar title="Hand over" back="Back to the record" to={`#/records/${id}`} />
      {observation ? <Files observation={observation} /> : null}
    </main>
  );
}

const NO_PLACE = 'areas without outlines: position or heading from true north is missing';
const NO_SCALE = 'needs the camera’s height and the horizon: View step of the photo';

function Files({ observation }: { readonly observation: Observation }) {
  const { id, files } = observation;
  const [leaves, setLeaves] = useState(observation.leftOut.includes('position'));
  const [keepsOriginal, setKeepsOriginal] = useState(false);
  const [notices, setNotices] = useState<readonly string[]>([]);
  const [message, setMessage] = useState('');
  const hasMap = files.some(({ role }) => role === 'thicknessNm');
  const hasOriginal = files.some(({ role }) => role === 'original');
  const picture = useRecordPicture(id, hasMapPicture(observation));
  const choice = { withoutPosition: leaves, keepOriginal: keepsOriginal };
  useEffect(() => {
    let stale = false;
    void messageOf(observation, { withoutPosition: leaves, keepOriginal: keepsOriginal }).then((text) => {
      if (!stale) setMessage(text);
    });
    return () => {
      stale = true;
    };
  }, [observation, leaves, keepsOriginal]);
  const write = (kind: ExportKind, words: string) => () =>
    void attempt(words, async () => setNotices(await handOver(kind, { id, ...choice })));
  const { headingDeg, headingReference } = observation.viewpoint;
  const isPlaced = !leaves && observation.position !== null && !!headingDeg && headingReference === 'true';
  const isBench = observation.viewpoint.from === 'bench';
  const noScale = hasScale(observation) ? null : NO_SCALE;
  const offered: readonly FileButton[] = [
    {
      name: 'Report',
      content: 'one page to print or save as PDF',
      icon: 'info',
      make: () => void attempt('laying out the report', () => printRecord(observation, choice, picture)),
    },
    {
      name: 'ZIP of everything',
      content: 'photo, map, report, checksums; comes back by Import',
      icon: 'save',
      make: write('zip', 'packing the ZIP'),
    },
    {
      name: 'Results CSV',
      content: 'every figure with its unit',
      icon: 'save',
      make: write('csv', 'writing'),
    },
    ...(hasMap
      ? ([
          {
            name: 'Map PNG',
            content: 'the map with its scale',
            icon: 'map',
            make: () => void attempt('drawing the map', () => handOverMap(observation)),
          },
          {
            name: 'Rows CSV',
            content: 'median thickness and interval by row',
            icon: 'save',
            make: write('rows', 'writing the rows'),
          },
          ...(isBench
            ? []
            : ([
                {
                  name: 'GeoJSON',
                  content: noScale ?? (isPlaced ? 'outline and classes, for a map program' : NO_PLACE),
                  icon: 'save',
                  make: noScale ? null : write('geojson', 'drawing outlines'),
                },
                {
                  name: 'GeoTIFF',
                  content:
                    noScale ?? `thickness on the water, metres${isPlaced ? '' : '; on a grid of its own'}`,
                  icon: 'save',
                  make: noScale ? null : write('geotiff', 'laying it on the water'),
                },
              ] as const)),
        ] as const)
      : []),
  ];
  return (
    <>
      <label class="check">
        <input
          type="checkbox"
          checked={leaves}
          onChange={(event) => {
            setLeaves(event.currentTarget.checked);
            setNotices([]);
          }}
        />
        <span>
          Leave the position out
          <small class="quiet">of the message and of every file; the sun’s place too</small>
        </span>
      </label>
      {leaves && hasOriginal ? (
        <label class="check">
          <input
            type="checkbox"
            checked={keepsOriginal}
            onChange={(event) => setKeepsOriginal(event.currentTarget.checked)}
          />
          <span>
            Original photo in the ZIP all the same
            <small class="quiet">its own data and what it shows may tell the place</small>
          </span>
        </label>
      ) : null}
      {notices.map((text) => (
        <p key={text} class="note small" role="status">
          {text}
        </p>
      ))}
      <Message text={message} />
      <ul class="files">
        {offered.map(({ name, content, icon, make }) => (
          <li key={name}>
            <button type="button" class="file" disabled={!make} onClick={make ?? undefined}>
              <Icon name={icon} />
              <span>
                {name}
                <small>{content}</small>
              </span>
            </button>
          </li>
        ))}
      </ul>
      <p class="small quiet">
        {isBench ? 'Indicative only.' : 'Indicative only: the responsible authority decides.'}
      </p>
    </>
  );
}

/** Whether the view was told well enough to lay the map on the water. */
function hasScale({ setup, photo }: Observation): boolean {
  if (!setup?.view || !photo) return false;
  const { measuredWidth: width, measuredHeight: height, metadata } = photo;
  return missingOfView(setup.view, { width, height, focalLength35mm: metadata.focalLength35mm }).length === 0;
}

interface FileButton {
  readonly name: string;
  readonly content: string;
  readonly icon: IconName;
  readonly make: (() => void) | null;
}

/** The short text for radio or a message. */
function Message({ text }: { readonly text: string }) {
  const [words, setWords] = useState<string | null>(null);
  const copy = async (event: Event & { currentTarget: HTMLButtonElement }) => {
    const area = event.currentTarget.closest('section')?.querySelector('textarea');
    try {
      await navigator.clipboard.writeText(text);
      setWords('Copied.');
    } catch {
      area?.focus();
      area?.select();
      setWords('This browser does not copy by itself: the text is marked, copy it by hand.');
    }
  };
  const share = async () => {
    try {
      await navigator.share({ text });
    } catch (error) {
      // Closing the share sheet is no failure.
      if (!(error instanceof DOMException && error.name === 'AbortError'))
        setWords('Sharing did not work here: copy the text.');
    }
  };
  return (
    <section class="message" aria-label="Message">
      <label class="field">
        <span>Message, to read out or send</span>
        <textarea readOnly rows={7} value={text} />
      </label>
      <div class="row">
        <button type="button" onClick={(event) => void copy(event)}>
          Copy
        </button>
        {'share' in navigator ? (
          <button type="button" onClick={() => void share()}>
            Share
          </button>
        ) : null}
      </div>
      {words ? (
        <p role="status" class="small">
          {words}
        </p>
      ) : null}
    </section>
  );
}
