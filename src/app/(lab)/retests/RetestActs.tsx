'use client';

import { useEffect, useId, useRef, useState, type FormEvent } from 'react';
import { useRouter } from 'next/navigation';
import { ProblemMessage } from '@/components/forms/ProblemMessage';
import { useSubmit } from '@/components/forms/useSubmit';
import { useKey } from '@/components/shell/keys';
import { useSheet } from '@/components/shell/sheetState';
import { Button } from '@/components/ui/Button';
import { AreaField, Field } from '@/components/ui/Field';
import { showToast } from '@/components/ui/Toast';
import type { RetestItem, RetestView } from '@/schemas/retest';

type Act = 'schedule' | 'withdraw' | 'reopen';
const CHANGE = { method: 'PATCH', path: '/api/retests/{id}' } as const;

/** What the lab does with a retest: place it (R), set it aside with a reason, take either back. */
export function RetestActs({ item }: { item: RetestItem }) {
  const { open } = useSheet();
  const [act, setAct] = useState<Act | null>(null);
  const base = useId();
  const isOpen = ['waiting', 'scheduled', 'measured'].includes(item.status);
  const canReopen = item.status === 'scheduled' || (item.status === 'withdrawn' && item.setAside);
  const acts: { act: Act; word: string }[] = [
    ...(isOpen ? [{ act: 'schedule' as const, word: item.status === 'scheduled' ? 'Place it anew' : 'Place it' }] : []),
    ...(isOpen ? [{ act: 'withdraw' as const, word: 'Withdraw' }] : []),
    ...(canReopen
      ? [{ act: 'reopen' as const, word: item.status === 'scheduled' ? 'Take off the plan' : 'Reopen' }]
      : []),
  ];
  useKey(
    'R',
    () => {
      open('retest');
      setAct('schedule');
    },
    { says: 'place the retest', when: isOpen },
  );
  function close() {
    const id = `${base}-${act}`;
    setAct(null);
    setTimeout(() => document.getElementById(id)?.focus(), 0);
  }
  if (acts.length === 0) return null;
  return (
    <div className="retest-acts">
      <div className="flex flex-wrap gap-2">
        {acts.map((one) => (
          <Button
            key={one.act}
            id={`${base}-${one.act}`}
            size="table"
            kind={one.act === 'schedule' ? 'plain' : 'quiet'}
            keyName={one.act === 'schedule' ? 'R' : undefined}
            aria-expanded={one.act === act}
            onClick={() => setAct(one.act === act ? null : one.act)}
          >
            {one.word}
          </Button>
        ))}
      </div>
      {act && acts.some((one) => one.act === act) && (
        <ActForm key={`${item.id} ${act}`} item={item} act={act} onClose={close} />
      )}
    </div>
  );
}

const TEXTS: Record<Act, { press: string; done: string; label: string; hint?: string }> = {
  schedule: { press: 'Place', done: 'is placed', label: 'Note', hint: 'As in: with M3, at position A' },
  withdraw: {
    press: 'Withdraw',
    done: 'is withdrawn',
    label: 'The reason',
    hint: 'It comes back only when it reads worse.',
  },
  reopen: { press: 'Reopen', done: 'is open', label: 'The reason' },
};

function ActForm({ item, act, onClose }: { item: RetestItem; act: Act; onClose: () => void }) {
  const router = useRouter();
  const first = useRef<HTMLFormElement>(null);
  const { submit, busy, problem, fieldErrors } = useSubmit<unknown, RetestView>(CHANGE);
  const [day, setDay] = useState(item.scheduledOn ?? '');
  const [text, setText] = useState(act === 'schedule' ? (item.note ?? '') : '');
  const { press, done, label, hint } = TEXTS[act];
  useEffect(() => first.current?.querySelector<HTMLElement>('input, textarea')?.focus(), []);

  async function save(event: FormEvent) {
    event.preventDefault();
    const body = act === 'schedule' ? { act, day: day || null, note: text.trim() || null } : { act, reason: text };
    const answer = await submit(body, { params: { id: item.id }, ifMatch: item.version });
    if (!answer.ok) return;
    showToast({ text: `${item.number} ${done}` });
    onClose();
    router.refresh();
  }

  return (
    <form ref={first} onSubmit={save} noValidate className="retest-form" aria-label={`${press} ${item.number}`}>
      {act === 'schedule' && (
        <Field
          label="Day, if it is known"
          type="date"
          value={day}
          error={fieldErrors.day && `The day ${fieldErrors.day}.`}
          onChange={(event) => setDay(event.target.value)}
        />
      )}
      {act === 'schedule' ? (
        <Field
          label={label}
          hint={hint}
          value={text}
          autoComplete="off"
          error={fieldErrors.note}
          onChange={(event) => setText(event.target.value)}
        />
      ) : (
        <AreaField
          label={label}
          hint={hint}
          value={text}
          rows={2}
          error={fieldErrors.reason && `The reason ${fieldErrors.reason}.`}
          onChange={(event) => setText(event.target.value)}
        />
      )}
      {problem && problem.errors.length === 0 && <ProblemMessage problem={problem} />}
      <div className="flex flex-wrap gap-2">
        <Button kind="primary" size="table" type="submit" busy={busy}>
          {press} {item.number}
        </Button>
        <Button kind="quiet" size="table" onClick={onClose}>
          Leave as it is
        </Button>
      </div>
    </form>
  );
}
