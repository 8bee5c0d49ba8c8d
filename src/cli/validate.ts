/** `npm run validate`: how far the reading is from the truth, scene by scene. See `--help`. */
import { writeFileSync } from 'node:fs';
import { parseValidateOptions, USAGE, type ValidateOptions } from './validate/options.ts';
import { loadEstimator, type SceneReading, type SceneTask } from './validate/readScene.ts';
import { type FilmKind, markdownTable, type ReportLine, table, verdict } from './validate/report.ts';
import { runTasks } from './validate/runTasks.ts';
import { summariseErrors } from './validate/statistics.ts';
import { STEP_NM, STEP_REACH_PX } from './validate/steps.ts';
import { tallyLines } from './validate/tallyReport.ts';

function percent(part: number, whole: number): string {
  return whole > 0 ? `${((100 * part) / whole).toFixed(1)} %` : '-';
}

function sum(readings: readonly SceneReading[], pick: (reading: SceneReading) => number): number {
  return readings.reduce((total, reading) => total + pick(reading), 0);
}

/** Two lines, as read and with the index error divided out. */
function linesFor(label: string, readings: readonly SceneReading[]): ReportLine[] {
  const seconds = sum(readings, (reading) => reading.estimateMs) / readings.length / 1000;
  const figures = summariseErrors(readings.map((reading) => reading.raw));
  const nearStep = percent(
    sum(readings, (reading) => reading.nearStepPixels),
    figures.filmPixels,
  );
  const notes = [`${seconds.toFixed(1)} s a photo`, `${nearStep} near steps`];
  const farOff = sum(readings, (reading) => reading.farOffPixels);
  if (farOff > 0) {
    const atSteps = percent(
      sum(readings, (reading) => reading.farOffNearStep),
      farOff,
    );
    notes.push(`with ${atSteps} of those > 50 nm`);
  }
  const bare = sum(readings, (reading) => reading.barePixels);
  if (bare > 0) {
    notes.push(
      `bare held ${percent(
        sum(readings, (reading) => reading.bareHeld),
        bare,
      )}`,
    );
  }
  const other = sum(readings, (reading) => reading.otherPixels);
  if (other > 0) {
    notes.push(
      `other read as film ${percent(
        sum(readings, (reading) => reading.otherGivenThickness),
        other,
      )}`,
    );
  }
  return [
    { label, figures, note: notes.join(', ') },
    {
      label: '  index error divided out',
      figures: summariseErrors(readings.map((reading) => reading.indexDivided)),
      note: '',
    },
  ];
}

function drawLine(reading: SceneReading): ReportLine {
  const { drawn, task, fit } = reading;
  return {
    label: `    seed ${task.seed}`,
    figures: summariseErrors([reading.raw]),
    note: [
      drawn.measuredSensor ?? '',
      String(reading.setup.film),
      `index off ${drawn.indexError.toFixed(4)}`,
      `${drawn.daylightK.toFixed(0)} K`,
      `${drawn.incidenceDeg.toFixed(0)}°`,
      `fit ${fit?.determined ?? 'none'}`,
      fit ? `residual ${fit.residualCodes.toFixed(2)} codes` : '',
    ]
      .filter((part) => part !== '')
      .join(', '),
  };
}

/** What is held against the aims: all scenes of a kind together, and oil without the slanted view. */
const GROUPS: readonly (readonly [string, FilmKind, (reading: SceneReading) => boolean])[] = [
  ['Soap film', 'soap', (reading) => reading.filmKind === 'soap'],
  ['Oil on water', 'oil', (reading) => reading.filmKind === 'oil'],
  [
    'Oil on water at one angle',
    'oil',
    (reading) => reading.filmKind === 'oil' && reading.task.scene !== 'oil-harbour',
  ],
];

function print(readings: readonly SceneReading[], options: ValidateOptions): void {
  for (const conditions of options.conditions) {
    const under = readings.filter((reading) => reading.task.conditions === conditions);
    const lines = options.scenes.flatMap((scene) => {
      const ofScene = under
        .filter((reading) => reading.task.scene === scene)
        .sort((a, b) => a.task.seed - b.task.seed);
      return [...linesFor(scene, ofScene), ...(options.each ? ofScene.map(drawLine) : [])];
    });
    console.log(`\nConditions: ${conditions}. ${options.draws} draws a scene from seed ${options.seed}.\n`);
    console.log(options.markdown ? markdownTable(lines) : table(lines));
    console.log();
    for (const [name, kind, belongs] of GROUPS) {
      const group = under.filter(belongs);
      if (group.length > 0) {
        const divided = summariseErrors(group.map((reading) => reading.indexDivided));
        console.log(verdict(name, kind, summariseErrors(group.map((reading) => reading.raw))));
        console.log(verdict(`${name}, index error divided out`, kind, divided));
      }
    }
    const tallies = tallyLines(under.flatMap(({ tally }) => tally ?? []));
    if (tallies.length > 0) console.log(`\n${tallies.join('\n')}`);
  }
  console.log(
    '\nAll film pixels in the marked region are counted; a pixel without an answer counts as infinitely far off in the' +
      '\nmedian and the 90th percentile, and is not counted as off by more than 50 nm. Pixels near steps lie within' +
      `\n${STEP_REACH_PX} pixels of a jump of more than ${STEP_NM} nm, finer than the colour of a JPEG; they are counted like all others.`,
  );
}

function asJson(readings: readonly SceneReading[]): string {
  return JSON.stringify(
    readings.map(({ raw, indexDivided, ...rest }) => ({
      ...rest,
      figures: summariseErrors([raw]),
      indexDivided: summariseErrors([indexDivided]),
    })),
    // JSON has no infinity: a quantile without an answer is null.
    (_, value: unknown) => (typeof value === 'number' && !Number.isFinite(value) ? null : value),
    1,
  );
}

async function main(argv: readonly string[]): Promise<number> {
  if (argv.includes('--help')) {
    console.log(USAGE);
    return 0;
  }
  let options: ValidateOptions;
  try {
    options = parseValidateOptions(argv);
  } catch (error) {
    console.error(error instanceof Error ? error.message : String(error));
    return 2;
  }
  if (!(await loadEstimator())) {
    console.error(
      'There is no estimator in this build (src/engine/estimate.ts), so nothing can be validated.',
    );
    return 2;
  }
  const started = performance.now();
  const tasks: SceneTask[] = [];
  for (const conditions of options.conditions) {
    for (let draw = 0; draw < options.draws; draw++) {
      for (const scene of options.scenes) {
        tasks.push({
          scene,
          conditions,
          seed: options.seed + draw,
          width: options.width,
          height: options.height,
        });
      }
    }
  }
  const readings: SceneReading[] = [];
  await runTasks(tasks, options.processes, (reading) => {
    readings.push(reading);
    if (process.stderr.isTTY) {
      process.stderr.write(`\r${readings.length} of ${tasks.length} scenes read`);
    }
  });
  print(readings, options);
  console.log(`\n${tasks.length} photos in ${((performance.now() - started) / 1000).toFixed(0)} s.`);
  if (options.json) {
    writeFileSync(options.json, `${asJson(readings)}\n`);
  }
  return 0;
}

process.exitCode = await main(process.argv.slice(2));
