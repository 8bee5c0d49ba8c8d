import { parseArgs } from 'node:util';
import { SCENE_NAMES, type SceneName } from '../../scene/catalogue.ts';
import { CONDITIONS, type ConditionName } from '../../scene/conditions.ts';

export interface ValidateOptions {
  readonly seed: number;
  readonly draws: number;
  readonly scenes: readonly SceneName[];
  readonly conditions: readonly ConditionName[];
  readonly width: number;
  readonly height: number;
  readonly processes: number;
  readonly json: string | null;
  readonly each: boolean;
  readonly markdown: boolean;
}

export const USAGE = `Usage: npm run validate -- [--seed N] [--draws N] [--scene NAME]... [--conditions NAME]...
  [--size WIDTHxHEIGHT] [--processes N] [--each] [--markdown] [--json FILE]
Renders scenes of known thickness through cameras drawn at random, reads them and prints how far off the reading is.
  --seed        first draw's number, default 1
  --draws       draws a scene, default 3
  --scene       ${SCENE_NAMES.join(', ')}; default all
  --conditions  ${Object.keys(CONDITIONS).join(', ')}; default stated
  --size        default 640x480
  --processes   default 2
  --each        also a line for every draw
  --markdown    the table as Markdown, for the README
  --json        write every figure, with what was drawn, to FILE`;

function oneOf<T extends string>(given: string, known: readonly T[], what: string): T {
  const found = known.find((name) => name === given);
  if (!found) {
    throw new RangeError(`There is no ${what} "${given}"; known are ${known.join(', ')}.`);
  }
  return found;
}

function wholeNumber(given: string, option: string, least: number): number {
  const value = Number(given);
  if (!Number.isSafeInteger(value) || value < least) {
    throw new RangeError(`Give ${option} as a whole number of at least ${least}, not "${given}".`);
  }
  return value;
}

/** Reads the command line. @throws RangeError or TypeError with a sentence that says what to do */
export function parseValidateOptions(argv: readonly string[]): ValidateOptions {
  const { values } = parseArgs({
    args: [...argv],
    options: {
      seed: { type: 'string', default: '1' },
      draws: { type: 'string', default: '3' },
      scene: { type: 'string', multiple: true },
      conditions: { type: 'string', multiple: true },
      size: { type: 'string', default: '640x480' },
      processes: { type: 'string', default: '2' },
      each: { type: 'boolean', default: false },
      markdown: { type: 'boolean', default: false },
      json: { type: 'string' },
    },
  });
  const size = /^(\d+)x(\d+)$/.exec(values.size);
  if (!size) {
    throw new RangeError(`Give --size as WIDTHxHEIGHT, such as 640x480, not "${values.size}".`);
  }
  return {
    seed: wholeNumber(values.seed, '--seed', 0),
    draws: wholeNumber(values.draws, '--draws', 1),
    scenes: values.scene?.map((name) => oneOf(name, SCENE_NAMES, 'scene')) ?? SCENE_NAMES,
    conditions: values.conditions?.map((name) =>
      oneOf(name, Object.keys(CONDITIONS) as ConditionName[], 'set of conditions'),
    ) ?? ['stated'],
    width: wholeNumber(size[1]!, 'the width in --size', 64),
    height: wholeNumber(size[2]!, 'the height in --size', 64),
    processes: wholeNumber(values.processes, '--processes', 1),
    json: values.json ?? null,
    each: values.each,
    markdown: values.markdown,
  };
}
