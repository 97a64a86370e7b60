'use client';

import { useCallback, useEffect, useRef, useState } from 'react';
import { fieldErrorsOf, waitingFor, type FieldErrors, type Problem } from './problem';
import { filledPath, IdempotencyKeys, send, type Outcome, type SendOptions, type Submittable } from './send';

export interface Submit<Body, Reply> {
  /** Resolves when the answer is here; pressed again before that, it is the same answer. */
  submit: (body?: Body, options?: SendOptions) => Promise<Outcome<Reply>>;
  busy: boolean;
  problem: Problem | null;
  fieldErrors: FieldErrors;
  /** Forgets the problem, as when the form is opened anew. */
  clear: () => void;
}

/**
 * The one way a form writes: `const { submit, busy, problem, fieldErrors } = useSubmit<Body, Reply>(operation)`. Sends
 * JSON (or a FormData) to our own origin, with an Idempotency-Key on a POST and If-Match where a version is given. The
 * form keeps its own values, so nothing typed is lost whatever the answer; while the server or its database does not
 * answer it says so in `problem`, stays `busy` and sends again by itself.
 */
export function useSubmit<Body = unknown, Reply = unknown>(operation: Submittable): Submit<Body, Reply> {
  const [busy, setBusy] = useState(false);
  const [problem, setProblem] = useState<Problem | null>(null);
  const flying = useRef<Promise<Outcome<Reply>> | null>(null);
  const keys = useRef<IdempotencyKeys>(null);
  const mounted = useRef(true);
  const leaving = useRef<AbortController>(null);
  const { method, path } = operation;

  useEffect(() => {
    mounted.current = true;
    leaving.current = new AbortController();
    return () => {
      mounted.current = false;
      // What is on its way arrives; it is only not sent again behind somebody's back.
      leaving.current?.abort();
    };
  }, []);

  const submit = useCallback(
    (body?: Body, options: SendOptions = {}): Promise<Outcome<Reply>> => {
      if (flying.current) return flying.current;
      keys.current ??= new IdempotencyKeys();
      const held = keys.current;
      const idempotencyKey = method === 'POST' ? held.keyFor(filledPath(path, options.params), body) : undefined;
      setBusy(true);
      const onWait = (why: Problem) => mounted.current && setProblem(waitingFor(why));
      const patience = { onWait, patience: leaving.current?.signal };
      const answer = send<Reply>({ method, path }, body, { ...patience, ...options, idempotencyKey }).then(
        (outcome) => {
          held.settle(outcome);
          flying.current = null;
          if (mounted.current) {
            setBusy(false);
            setProblem(outcome.ok ? null : outcome.problem);
          }
          return outcome;
        },
      );
      flying.current = answer;
      return answer;
    },
    [method, path],
  );

  const clear = useCallback(() => setProblem(null), []);
  return { submit, busy, problem, fieldErrors: fieldErrorsOf(problem), clear };
}
