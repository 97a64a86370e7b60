'use client';

import { useRef, useState } from 'react';
import { waitingFor, type Problem } from '@/components/forms/problem';
import { IdempotencyKeys, send } from '@/components/forms/send';
import { keepFinals, type FinalsBody, type FinalsKept } from '@/schemas/finals';

/** The typed rows of one position, with which row each of its finals is. */
export interface PositionToKeep {
  position: string;
  body: FinalsBody;
  keys: string[];
}

/** What was not kept and why; `keys` are the rows of the body that was sent. */
export interface NotKept {
  position: string;
  keys: string[];
  problem: Problem;
}

/**
 * Keeps position after position, each in an act of its own; what one refuses does not undo those before it. The
 * Idempotency-Key stays with what was sent until there is an answer, so that a second press keeps the same thing once.
 */
export function useKeepFinals(onKept: (kept: FinalsKept, keys: string[]) => void) {
  const [busy, setBusy] = useState(false);
  const [refused, setRefused] = useState<NotKept | null>(null);
  const flying = useRef(false);
  const held = useRef(new Map<string, IdempotencyKeys>());

  async function keep(positions: readonly PositionToKeep[]): Promise<void> {
    if (flying.current) return;
    flying.current = true;
    setBusy(true);
    setRefused(null);
    for (const { position, body, keys } of positions) {
      const idempotency = held.current.get(position) ?? new IdempotencyKeys();
      held.current.set(position, idempotency);
      const outcome = await send<FinalsKept>(keepFinals, body, {
        idempotencyKey: idempotency.keyFor(keepFinals.path, body),
        onWait: (problem) => setRefused({ position, keys, problem: waitingFor(problem) }),
      });
      idempotency.settle(outcome);
      setRefused(outcome.ok ? null : { position, keys, problem: outcome.problem });
      if (!outcome.ok) break;
      onKept(outcome.reply, keys);
    }
    flying.current = false;
    setBusy(false);
  }

  return { keep, busy, refused };
}
