import { SetupError } from '../engine/prepareScene.ts';
import { PhotoError } from '../photo/types.ts';
import { UsageError } from './arguments.ts';

/** Exit code of a mistake in what was typed, of a set-up or a photo that cannot be used. */
const BAD_INPUT = 2;

/** Runs a command: what a person can mend becomes one line on stderr, anything else a stack trace. */
export async function runCommand(main: () => Promise<number>): Promise<void> {
  try {
    process.exitCode = await main();
  } catch (error) {
    const known = error instanceof UsageError || error instanceof SetupError || error instanceof PhotoError;
    if (!known) throw error;
    console.error(error.message.replaceAll('\n', ' '));
    process.exitCode = BAD_INPUT;
  }
}
