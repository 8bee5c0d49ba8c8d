import { useEffect } from 'preact/hooks';
import type { Observation } from '../../record/observation.ts';
import { Icon } from '../parts/Icon.tsx';
import { failure, image } from '../state.ts';
import { attempt, edit, flush, retry, show, shown, theDesk, theStore } from './desk.ts';
import { ConditionsFact } from './fields/ConditionsFact.tsx';
import { LongTextField, TextField } from './fields/Inputs.tsx';
import { ObserverFact, OilFact, ToldFact } from './fields/PeopleFacts.tsx';
import { PositionFact } from './fields/PositionFact.tsx';
import { TimeFact } from './fields/TimeFact.tsx';
import { ViewFact } from './fields/ViewFact.tsx';
import { figuresOf } from './figures.ts';
import { handOver } from './handOverFiles.ts';
import { removed } from './RecordList.tsx';
import { RecordPicture } from './RecordPicture.tsx';
import { ScreenBar } from './ScreenBar.tsx';
import { workedOn } from './saveRecord.ts';
import { openPhotoOf } from './workAgain.ts';

/** One record: what came out, what is known, what is not. Every change is kept at once. */
export function RecordScreen({ id }: { readonly id: string }) {
  useEffect(() => {
    void show(id);
    return () => void flush();
  }, [id]);
  const record = shown.value?.observation.id === id ? shown.value : null;
  const observation = record?.observation;
  return (
    <main class="page records" aria-busy={!observation}>
      <ScreenBar title="Record" back="All records" to="#/records" />
      {record && observation ? (
        <>
          {record.problem ? (
            <NotKept id={id} problem={record.problem} />
          ) : (
            <p class="badge">Saved on this device</p>
          )}
          {failure.value ? (
            <p role="alert" class="note warn">
              {failure.value}
            </p>
          ) : null}
          <Body observation={observation} />
        </>
      ) : null}
    </main>
  );
}

/** There was no room: nothing is lost while the ZIP can be taken. */
function NotKept({ id, problem }: { readonly id: string; readonly problem: string }) {
  const take = () =>
    void attempt('writing the ZIP', () =>
      handOver('zip', { id, withoutPosition: false, keepOriginal: true }),
    );
  return (
    <section class="not-kept" role="alert">
      <p class="warn">{problem}</p>
      <div class="row">
        <button type="button" class="primary" onClick={take}>
          <Icon name="save" />
          Save as ZIP
        </button>
        <button type="button" class="plain" onClick={() => void retry()}>
          Try again
        </button>
      </div>
    </section>
  );
}

function Body({ observation }: { readonly observation: Observation }) {
  const { id, title, remarks, lookAlikes, notKnown, viewpoint } = observation;
  const isBench = viewpoint.from === 'bench';
  return (
    <>
      <TextField
        label="Title"
        value={title}
        onValue={(text) => edit((before) => ({ ...before, title: text }))}
      />
      <RecordPicture observation={observation} />
      <dl class="figures">
        {figuresOf(observation).map(({ name, value, more }) => (
          <div key={name}>
            <dt>{name}</dt>
            <dd>
              {value}
              {more ? <small class="quiet">{more}</small> : null}
            </dd>
          </div>
        ))}
      </dl>
      <section class="facts" aria-label="What is known">
        <TimeFact observation={observation} />
        {isBench ? null : <PositionFact observation={observation} />}
        <ViewFact observation={observation} />
        <ConditionsFact observation={observation} />
        {isBench ? null : <OilFact observation={observation} />}
        <ObserverFact observation={observation} />
        {isBench ? null : (
          <>
            <ToldFact observation={observation} />
            <a class="fact fact-link" href={`#/records/${id}/look-alikes`}>
              <span class="fact-name">Is it oil?</span>
              <span class={lookAlikes ? 'fact-value' : 'fact-value quiet'}>
                {lookAlikes?.reason ?? 'not checked for look-alikes'}
              </span>
            </a>
          </>
        )}
        <LongTextField
          label="Remarks"
          value={remarks}
          onValue={(text) => edit((before) => ({ ...before, remarks: text }))}
        />
      </section>
      <section aria-label="Not known">
        <h2>Not known</h2>
        {notKnown.length > 0 ? (
          <ul class="unknown small">
            {notKnown.map((text) => (
              <li key={text}>{text}</li>
            ))}
          </ul>
        ) : (
          <p class="quiet">Nothing that is usually recorded is missing.</p>
        )}
      </section>
      <Cautions observation={observation} />
      <Actions observation={observation} />
    </>
  );
}

/** What the reading and the tally said. */
function Cautions({ observation: { result } }: { readonly observation: Observation }) {
  const texts = [...(result?.summary?.notices ?? []), ...(result?.notices ?? [])].map(({ text }) => text);
  const each = [...new Set(texts)];
  if (each.length === 0) return null;
  return (
    <details class="fact">
      <summary>
        <span class="fact-name">Cautions</span>
        <span class="fact-value">{each.length} to read before use</span>
      </summary>
      <ul class="unknown small">
        {each.map((text) => (
          <li key={text}>{text}</li>
        ))}
      </ul>
    </details>
  );
}

function Actions({ observation }: { readonly observation: Observation }) {
  const { id, title, photo } = observation;
  const isOpen = image.value !== null && workedOn.value?.id === id;
  const duplicate = () =>
    void attempt('copying', async () => {
      await flush();
      location.hash = `#/records/${await (await theStore()).duplicate(id)}`;
    });
  const remove = () =>
    void attempt('deleting', async () => {
      await flush();
      await (await theStore()).remove(id);
      removed.value = { id, title: title || 'Untitled record' };
      shown.value = null;
      if (workedOn.value?.id === id) workedOn.value = null;
      location.hash = '#/records';
    });
  return (
    <>
      <div class="row tight">
        <button type="button" class="plain" onClick={duplicate}>
          <Icon name="plus" />
          Duplicate
        </button>
        <button type="button" class="plain" onClick={remove}>
          <Icon name="remove" />
          Delete
        </button>
      </div>
      <div class="low dock">
        <div class="row">
          {isOpen ? (
            <a class="button" href="#/">
              <Icon name="photo" />
              Photo
            </a>
          ) : photo ? (
            <button
              type="button"
              onClick={() => void attempt('opening the photo', () => openPhotoOf(theDesk(), observation))}
            >
              <Icon name="photo" />
              Photo
            </button>
          ) : null}
          <a class="button primary" href={`#/records/${id}/hand-over`}>
            <Icon name="save" />
            Hand over
          </a>
        </div>
      </div>
    </>
  );
}
