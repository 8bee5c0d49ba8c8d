/** Long work is done in turns of about this long, ms, so that the page goes on answering. */
const TURN_MS = 10;

export const pause = () => new Promise<void>((resolve) => setTimeout(resolve, 0));

/** A function to await between pieces of long work: it lets the page breathe when the turn is over, else returns at once. */
export function inTurns(): () => Promise<void> {
  let began = performance.now();
  return async () => {
    if (performance.now() - began < TURN_MS) return;
    await pause();
    began = performance.now();
  };
}
