import { useEffect } from 'preact/hooks';
import type { TallyInMetres, TallyReport } from '../../engine/tallyContract.ts';
import { areaFigures } from '../../record/inWords.ts';
import { type VolumeByCode, volumeByCode } from '../../tally/appearanceCode.ts';
import { atLeastCode, givenShares, ownShares, tally, tallyFault, workOutAmount } from '../amountState.ts';
import { areaUnitOf } from '../amountUnits.ts';
import { chooseMarking, result, setup, step } from '../state.ts';
import { missingView } from '../viewState.ts';
import { grouped } from '../words/numbers.ts';
import { AmountShares } from './AmountShares.tsx';
import { AmountUnits } from './AmountUnits.tsx';
import { SeenFrom } from './SeenFrom.tsx';
import { TwoMethods } from './TwoMethods.tsx';
import { MISSING_WORDS } from './ViewStep.tsx';

const percent = (share: number) => `${(100 * share).toFixed(share > 0 && share < 0.01 ? 1 : 0)} %`;

/** How much: area, coverage, and the volume by two methods side by side. */
export function AmountStep() {
  const measured = result.value;
  const said = setup.value;
  const report = tally.value;
  useEffect(() => {
    if (measured) void workOutAmount();
  }, [measured, said]);
  if (!measured) {
    return (
      <section aria-label="Amount">
        <h1>Measure first</h1>
        <p class="quiet">The amount follows from the map.</p>
      </section>
    );
  }
  return (
    <section aria-label="Amount" class="amount" aria-busy={report === null}>
      <h1>How much</h1>
      {tallyFault.value ? (
        <p role="alert" class="note warn">
          {tallyFault.value}
        </p>
      ) : null}
      {report ? <Report report={report} /> : <p class="quiet">Adding up.</p>}
    </section>
  );
}

function Report({ report }: { readonly report: TallyReport }) {
  const reasons = report.comparison?.reasons ?? [];
  return (
    <>
      {report.scale === 'metres' ? (
        <>
          <TwoMethods byThickness={report.byThickness} byCode={codeNow(report)} />
          <Areas report={report} />
          <AmountUnits />
        </>
      ) : (
        <NoScale report={report} />
      )}
      <WholePhoto />
      {reasons.length > 0 ? (
        <>
          <h2>{report.comparison?.overlap ? 'Why they differ' : 'They do not agree'}</h2>
          {reasons.map(({ code, text }) => (
            <p key={code} class="small">
              {text}
            </p>
          ))}
        </>
      ) : null}
      <AmountShares report={report} />
      {report.shares.atLeast > 0 ? <PastColour share={report.shares.atLeast} /> : null}
      <SeenFrom />
      {report.notices.length > 0 ? <h2>Read before use</h2> : null}
      {report.notices
        .filter(({ code }) => code !== 'no-scale')
        .map(({ code, text }) => (
          <p key={code} class="note small warn">
            {text}
          </p>
        ))}
    </>
  );
}

/** A change of the shares takes effect at once; the rest follows when the worker has answered. */
function codeNow({ shares, area, mapped, byCode }: TallyInMetres): VolumeByCode | null {
  const own = ownShares(shares.ofMap, givenShares.value);
  if (own) return volumeByCode(area.oiledM2, own);
  if (shares.from === 'map') return byCode;
  return shares.ofMap && volumeByCode(mapped.codedM2, shares.ofMap);
}

function Areas({ report }: { readonly report: TallyInMetres }) {
  const area = areaFigures(report.byThickness.oiledM2, areaUnitOf());
  return (
    <dl class="key-figures">
      <div>
        <dt>Oiled area</dt>
        <dd>
          {grouped(area.best)} {area.unit.symbol}
          <small>
            {grouped(area.least)} to {grouped(area.most)}
          </small>
        </dd>
      </div>
      <Covered report={report} />
    </dl>
  );
}

function Covered({ report }: { readonly report: TallyReport }) {
  const { share, least, most } = report.coverage;
  return (
    <div>
      <dt>Coverage</dt>
      <dd>
        {share === null ? 'no answer' : percent(share)}
        {least !== null && most !== null && percent(least) !== percent(most) ? (
          <small>
            {percent(least).replace(/ %$/, '')} to {percent(most)}: some water gave no answer
          </small>
        ) : null}
      </dd>
    </div>
  );
}

function NoScale({ report }: { readonly report: TallyReport }) {
  const missing = missingView.value.map((id) => MISSING_WORDS[id]);
  return (
    <>
      <dl class="key-figures">
        <Covered report={report} />
      </dl>
      <p class="note">
        No area and no litres yet: give {missing.length > 0 ? missing.join(', ') : 'where the camera stood'}.
      </p>
      <button type="button" class="primary" onClick={() => (step.value = 'view')}>
        Set the view
      </button>
    </>
  );
}

/** Without a region everything below the horizon is taken for water. */
function WholePhoto() {
  const { region, strokes } = setup.value;
  if (region || (strokes && strokes.length > 0)) return null;
  return (
    <div class="note warn">
      <p>No part is marked: quay, boats and shore count as water too.</p>
      <button
        type="button"
        class="plain"
        onClick={() => {
          step.value = 'mark';
          chooseMarking('in');
        }}
      >
        Paint in the water
      </button>
    </div>
  );
}

/** Film past the end of colour: only the eye can say whether it was a mirror. */
function PastColour({ share }: { readonly share: number }) {
  const choose = (code: 2 | 3) => {
    atLeastCode.value = code;
    void workOutAmount();
  };
  return (
    <fieldset class="field">
      <legend class="small quiet">{percent(share)} is too thick for colour. It looked like:</legend>
      <div class="segments words">
        <button type="button" aria-pressed={atLeastCode.value === 2} onClick={() => choose(2)}>
          Rainbow
        </button>
        <button type="button" aria-pressed={atLeastCode.value === 3} onClick={() => choose(3)}>
          A mirror, metallic
        </button>
      </div>
    </fieldset>
  );
}
