import { setTimeout as sleep } from 'node:timers/promises';

/** A request of somebody else asks the database a dozen things in turn: one turn of the event loop a row would be no answer. */
const pauseMs = 30;
const mostWithoutPauseMs = 60;

/**
 * Long work in short pieces, with time for everybody else between them. `atPause` is told what the last piece yielded and
 * may throw to give up.
 */
export async function betweenTurns<Piece, Result>(
  steps: Generator<Piece, Result>,
  atPause: (piece: Piece) => Promise<void> | void = () => undefined,
): Promise<Result> {
  let since = performance.now();
  for (;;) {
    const step = steps.next();
    if (step.done === true) return step.value;
    if (performance.now() - since < mostWithoutPauseMs) continue;
    await atPause(step.value);
    await sleep(pauseMs);
    since = performance.now();
  }
}
