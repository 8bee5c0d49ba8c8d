import { DATA_SOURCES } from '../colour/dataSources.ts';
import { MATERIAL_IDS, materialById } from '../optics/materials/index.ts';
import { Icon } from './parts/Icon.tsx';
import { ThemeButton } from './parts/ThemeButton.tsx';

declare const __APP_VERSION__: string;

const LIBRARIES: readonly (readonly [string, string])[] = [
  ['preact, @preact/signals', 'MIT'],
  ['culori', 'MIT'],
  ['workbox', 'MIT'],
  ['exifr', 'MIT'],
  ['idb', 'ISC'],
  ['fflate', 'MIT'],
  ['fast-png', 'MIT'],
  ['valibot', 'MIT'],
  ['d3-contour', 'ISC'],
  ['suncalc', 'BSD-2-Clause'],
];

/** What the tool is, what it is not, and whose work it stands on. */
export function AboutScreen() {
  return (
    <main class="page about">
      <div class="bar">
        <a class="button" href="#/" aria-label="Back to the start">
          <Icon name="back" />
        </a>
        <h1>About</h1>
        <ThemeButton />
      </div>
      <p>
        Tintfathom {__APP_VERSION__} works out which colours a thin film can have, fits the photo’s own camera
        to them, and reads thickness with a 90 % interval. Everything happens on this device: nothing is sent.
      </p>
      <p class="note warn">
        Readings are indicative. Decisions on response, health and closures belong to the responsible
        authority and to licensed people. Duties to report do not wait for a number.
      </p>
      <details>
        <summary>
          <h2>Figures</h2>
        </summary>
        <dl>
          {DATA_SOURCES.map((entry) => (
            <>
              <dt>{entry.title}</dt>
              <dd class="small quiet">
                {entry.source}. {entry.licence}.
              </dd>
            </>
          ))}
        </dl>
      </details>
      <details>
        <summary>
          <h2>Materials</h2>
        </summary>
        <dl>
          {MATERIAL_IDS.map((id) => {
            const material = materialById(id);
            return (
              <>
                <dt>{material.name}</dt>
                <dd class="small quiet">
                  {material.source}.
                  {material.indexSpread > 0
                    ? ` Index known to ±${material.indexSpread} (one standard deviation).`
                    : ' Index taken as exact.'}
                </dd>
              </>
            );
          })}
        </dl>
      </details>
      <details>
        <summary>
          <h2>Libraries</h2>
        </summary>
        <ul class="small">
          {LIBRARIES.map(([name, licence]) => (
            <li key={name}>
              {name}: {licence}
            </li>
          ))}
        </ul>
      </details>
      <p class="small quiet">Tintfathom itself is under the MIT licence.</p>
    </main>
  );
}
