import type { Problem } from '@/components/forms/problem';
import { send, type Outcome } from '@/components/forms/send';
import { keepSweepOperation, type SweepView } from '@/schemas/sweep';
import type { DropEntry } from './dropEntry';
import { keepBody } from './draft';

const TRIES = 60;
const BUSY_MS = 3000;

/**
 * Keeps one file as a run, in a transaction of its own. The Idempotency-Key follows from what is asked, so that a second
 * press, a lost answer or a reloaded page cannot keep the same thing twice. A busy server is waited for.
 * @returns null when something is still unsaid
 */
export async function keepEntry(
  { file, draft }: DropEntry,
  onWait: (problem: Problem) => void,
): Promise<Outcome<SweepView> | null> {
  const body = file && draft && keepBody(draft, file);
  if (!file || !body) return null;
  const idempotencyKey = `keep-${file.id}-${fingerprint(JSON.stringify(body))}`;
  for (let left = TRIES; ; left--) {
    const outcome = await send<SweepView>(keepSweepOperation, body, { idempotencyKey, onWait });
    if (outcome.ok || outcome.problem.status !== 429 || left === 0) return outcome;
    onWait(outcome.problem);
    await new Promise((resolve) => setTimeout(resolve, (outcome.problem.retryAfterS ?? 0) * 1000 || BUSY_MS));
  }
}

/** Tells one body from another; the server compares them whole, so that a chance likeness is refused and not mixed up. */
function fingerprint(text: string): string {
  let [high, low] = [0x811c9dc5, 0x1234567];
  for (let i = 0; i < text.length; i++) {
    high = Math.imul(high ^ text.charCodeAt(i), 0x01000193);
    low = Math.imul(low ^ text.charCodeAt(i), 0x85ebca6b) ^ (high >>> 13);
  }
  return `${(high >>> 0).toString(36)}${(low >>> 0).toString(36)}`;
}
