import { setImmediate as nextTurn } from 'node:timers/promises';

const SLICE_MS = 8;

/** Runs a stepwise computation to its end, giving other requests the event loop whenever 8 ms have passed. */
export async function inTurns<T>(steps: Generator<void, T>): Promise<T> {
  let since = performance.now();
  for (;;) {
    const step = steps.next();
    if (step.done) return step.value;
    if (performance.now() - since > SLICE_MS) {
      await nextTurn();
      since = performance.now();
    }
  }
}
