import { parseArgs } from 'node:util';

export interface EstimateArguments {
  readonly photo: string;
  readonly setup: string;
  readonly out: string;
  /** Leave the position out of everything that is written. */
  readonly noPosition: boolean;
}

export const USAGE = `Usage: npm run --silent estimate -- PHOTO --setup SETUP.json --out DIR [--no-position]

Reads film thickness from a photo. SETUP.json says what the film is, what lights it and what is marked on the photo;
its form is in src/engine/setup.schema.json. DIR is made if it is not there; files in it are replaced.
--no-position leaves the place out of all results (the photo itself is not changed, and its picture may tell the place).
Exit codes: 0 done, 2 bad input (one line on stderr says what).`;

/** A mistake in what was typed, in one line. */
export class UsageError extends Error {
  override readonly name = 'UsageError';
}

/** @throws UsageError when a part is missing or not known */
export function parseEstimateArguments(argv: readonly string[]): EstimateArguments | 'help' {
  let parsed: ReturnType<typeof parse>;
  try {
    parsed = parse(argv);
  } catch (error) {
    throw new UsageError(
      `${error instanceof Error ? error.message : String(error)} Say --help for how to use it.`.replaceAll(
        '\n',
        ' ',
      ),
    );
  }
  const { values, positionals } = parsed;
  if (values.help) return 'help';
  const [photo, ...more] = positionals;
  if (!photo || more.length > 0)
    throw new UsageError('Give exactly one PHOTO; say --help for how to use it.');
  if (!values.setup)
    throw new UsageError('Name the set-up with --setup SETUP.json; say --help for how to use it.');
  if (!values.out)
    throw new UsageError('Name a folder for the results with --out DIR; say --help for how to use it.');
  return { photo, setup: values.setup, out: values.out, noPosition: values['no-position'] };
}

function parse(argv: readonly string[]) {
  return parseArgs({
    args: [...argv],
    allowPositionals: true,
    options: {
      setup: { type: 'string' },
      out: { type: 'string' },
      'no-position': { type: 'boolean', default: false },
      help: { type: 'boolean', short: 'h' },
    },
  });
}
