import { useEffect, useState } from 'preact/hooks';
import { SAFETY_CAUTIONS } from '../../tally/cautions.ts';
import {
  type Answer,
  LOOK_ALIKE_QUESTIONS,
  type LookAlikeConclusion,
  type LookAlikeQuestionId,
  weighLookAlikes,
} from '../../tally/lookAlikes.ts';
import { Icon } from '../parts/Icon.tsx';
import { edit, flush, show, shown } from './desk.ts';
import { ScreenBar } from './ScreenBar.tsx';

type Answers = Readonly<Partial<Record<LookAlikeQuestionId, Answer>>>;

const CONCLUSIONS: Readonly<Record<LookAlikeConclusion, string>> = {
  petroleumLikely: 'Petroleum likely',
  biogenicLikely: 'Biogenic likely',
  cannotSay: 'Cannot say',
};

const ANSWERS: readonly (readonly [Answer, string])[] = [
  ['yes', 'Yes'],
  ['no', 'No'],
  ['unknown', 'Cannot tell'],
];

/** The reason without the conclusion, which stands above it as a heading. */
function said(reason: string): string {
  const rest = reason.replace(/^[A-Z][a-z ]+: /, '');
  return `${(rest[0] ?? '').toUpperCase()}${rest.slice(1)}`;
}

/** Is it oil? Safety first, then one question at a time; the answers and the conclusion are kept in the record. */
export function LookAlikeScreen({ id }: { readonly id: string }) {
  useEffect(() => {
    void show(id);
    return () => void flush();
  }, [id]);
  const observation = shown.value?.observation.id === id ? shown.value.observation : null;
  /** -1 shows the cautions; past the last question the conclusion. */
  const [at, setAt] = useState(-1);
  const answers: Answers = observation?.lookAlikes?.answers ?? {};
  const answer = (question: LookAlikeQuestionId, said: Answer) => {
    const next = { ...answers, [question]: said };
    const { conclusion, reason } = weighLookAlikes(next);
    edit((before) => ({ ...before, lookAlikes: { answers: next, conclusion, reason } }));
    setAt(at + 1);
  };
  const question = LOOK_ALIKE_QUESTIONS[at];
  return (
    <main class="page records" aria-busy={!observation}>
      <ScreenBar title="Is it oil?" back="Back to the record" to={`#/records/${id}`} />
      {!observation ? null : at < 0 ? (
        <>
          <h2>Before you go near</h2>
          <ul class="cautions">
            {SAFETY_CAUTIONS.map(({ code, text }) => (
              <li key={code}>{text}</li>
            ))}
          </ul>
          <div class="low">
            <button type="button" class="primary" onClick={() => setAt(0)}>
              Begin
            </button>
          </div>
        </>
      ) : question ? (
        <>
          <p class="quiet small">
            Question {at + 1} of {LOOK_ALIKE_QUESTIONS.length}
          </p>
          <section aria-live="polite" class="question">
            <h2>{question.text}</h2>
            <p class="quiet">{question.help}</p>
          </section>
          <div class="low answers">
            {ANSWERS.map(([said, name]) => (
              <button
                key={said}
                type="button"
                aria-pressed={answers[question.id] === said}
                onClick={() => answer(question.id, said)}
              >
                {name}
              </button>
            ))}
            <button type="button" class="plain" onClick={() => setAt(at - 1)}>
              <Icon name="back" />
              Back
            </button>
          </div>
        </>
      ) : (
        <>
          <section class="question" role="status">
            <h2 class="lead">{CONCLUSIONS[observation.lookAlikes?.conclusion ?? 'cannotSay']}</h2>
            <p>{said(observation.lookAlikes?.reason ?? '')}</p>
            <p class="small quiet">
              A rough check, not a proof: a sample settles it. It is kept in the record.
            </p>
          </section>
          <div class="low">
            <button type="button" class="plain" onClick={() => setAt(0)}>
              <Icon name="undo" />
              Answer again
            </button>
            <a class="button primary" href={`#/records/${id}`}>
              Back to the record
            </a>
          </div>
        </>
      )}
    </main>
  );
}
