import { exportMap, exportRows, exportSummary } from '../handOver.ts';
import { Icon } from '../parts/Icon.tsx';
import { handing } from '../state.ts';

/** Files to take along, each with what is in it. */
const FILES = [
  ['Map PNG', 'the map with its scale', exportMap],
  ['Rows CSV', 'median thickness and interval by row', exportRows],
  ['Summary', 'JSON: set-up, counts, fit, notices', exportSummary],
] as const;

export function HandOver() {
  return (
    <section aria-label="Hand over">
      <div class="headline">
        <h1>Hand over</h1>
        <button type="button" class="plain" aria-label="Close" onClick={() => (handing.value = false)}>
          <Icon name="remove" />
        </button>
      </div>
      {FILES.map(([name, content, write]) => (
        <button key={name} type="button" class="file" onClick={() => void write()}>
          <Icon name="save" />
          <span>
            {name}
            <small>{content}</small>
          </span>
        </button>
      ))}
      <p class="small quiet">Indicative only: the responsible authority decides.</p>
    </section>
  );
}
