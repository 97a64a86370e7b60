'use client';

import { useRouter } from 'next/navigation';
import { useMemo, useState, useTransition, type FormEvent } from 'react';
import {
  budgetBodyOf,
  budgetDraftOf,
  EMPTY_ROW,
  liveBudget,
  type BudgetDraft,
  type DraftPurpose,
  type RangeDraft,
} from '@/components/forms/budgetDraft';
import { ProblemMessage } from '@/components/forms/ProblemMessage';
import { useDraft } from '@/components/forms/useDraft';
import { useSubmit } from '@/components/forms/useSubmit';
import { useKey } from '@/components/shell/keys';
import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { Message } from '@/components/ui/Message';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { showToast } from '@/components/ui/Toast';
import { belowFinalWords, INSTRUMENTATION_ONLY } from '@/format/budgets';
import { capitalised } from '@/format/words';
import type { PathRecord } from '@/schemas/paths';
import { BudgetRange } from './BudgetRange';
import { PATH_WRITES } from './pathWrites';
import './budget.css';

const PURPOSES = ['final', 'prescan'] as const;

/** The budgets of a path's next revision, with what they come to while they are typed. Survives a reload. */
export function BudgetForm({ path, onClose }: { path: PathRecord; onClose: () => void }) {
  const router = useRouter();
  const [draft, setDraft, forget] = useDraft<BudgetDraft>(`budget ${path.id} ${path.revision}`, () =>
    budgetDraftOf(path.uncertainty, path.uncertaintySource),
  );
  const { submit, busy, problem, fieldErrors, clear } = useSubmit<object, PathRecord>(PATH_WRITES.reviseUncertainty);
  const [wrong, setWrong] = useState<readonly string[]>([]);
  const [loading, startLoading] = useTransition();
  const live = useMemo(() => liveBudget(draft), [draft]);
  useKey('Escape', leave);

  const setRanges = (purpose: DraftPurpose, ranges: RangeDraft[]) => setDraft({ ...draft, [purpose]: ranges });
  const next = path.revision + 1;

  function leave() {
    forget();
    onClose();
  }
  async function save(event: FormEvent) {
    event.preventDefault();
    const made = budgetBodyOf(draft);
    setWrong('wrong' in made ? made.wrong : []);
    if ('wrong' in made) return;
    const answer = await submit(made.body, { params: { id: path.id }, ifMatch: path.version });
    if (!answer.ok) return;
    forget();
    showToast({ text: `Uncertainty of ${path.code} entered as revision ${answer.reply.revision}` });
    router.refresh();
    onClose();
  }
  const words = (name: 'uncertaintySource' | 'reason', label: string, hint?: string) => ({
    label,
    name,
    value: draft[name],
    hint,
    maxLength: 300,
    autoComplete: 'off',
    error: fieldErrors[name] && `${label} ${fieldErrors[name]}.`,
    onChange: (event: { target: { value: string } }) => setDraft({ ...draft, [name]: event.target.value }),
  });
  const inBudget = (problem?.errors ?? []).filter(({ pointer }) => pointer.startsWith('/budget'));

  return (
    <form onSubmit={save} noValidate aria-label={`Uncertainty of ${path.code}, revision ${next}`} className="pb-2">
      <SectionHeading className="mt-4" remark={`revision ${next}; runs keep the one they were judged with`}>
        Revise the uncertainty
      </SectionHeading>
      <p className="t-text mt-2">
        One row for each contribution in dB: the half-width of its interval, or its stated uncertainty with k. They are
        taken as uncorrelated. {INSTRUMENTATION_ONLY}
      </p>
      {PURPOSES.map((purpose) => (
        <fieldset key={purpose} className="mt-4 min-w-0">
          <legend className="t-text font-semibold">For a {purpose}</legend>
          {draft[purpose].map((range, at) => (
            <BudgetRange
              key={at}
              name={`${purpose}/${at}`}
              purpose={purpose}
              port={path.port}
              range={range}
              live={live.ranges[purpose][at]!}
              wrong={wrong}
              onChange={(changed) =>
                setRanges(
                  purpose,
                  draft[purpose].map((one, i) => (i === at ? changed : one)),
                )
              }
              onRemove={
                draft[purpose].length > 1
                  ? () =>
                      setRanges(
                        purpose,
                        draft[purpose].filter((_, i) => i !== at),
                      )
                  : null
              }
            />
          ))}
          <div className="mt-2 flex flex-wrap gap-2">
            <Button
              size="table"
              onClick={() => setRanges(purpose, [...draft[purpose], { from: '', to: '', rows: [EMPTY_ROW] }])}
            >
              Add a range
            </Button>
            {purpose === 'prescan' && (
              <Button size="table" onClick={() => setRanges('prescan', structuredClone(draft.final))}>
                Start from the {draft.final.length === 1 ? 'budget' : `${draft.final.length} budgets`} of the final
              </Button>
            )}
          </div>
        </fieldset>
      ))}
      {live.below.map((one) => (
        <Message
          key={one.fromHz}
          tone="over"
          lead="The prescan claims to be more certain than the final."
          live="polite"
          className="mt-3"
        >
          {capitalised(belowFinalWords(one))}. A prescan leaves out what a final contains, so this is not entered.
        </Message>
      ))}
      <div className="mt-4 grid gap-3 pad:grid-cols-2">
        <Field
          {...words('uncertaintySource', 'Basis of the budget', 'A document and its date, or your own measurements.')}
        />
        <Field {...words('reason', 'Reason', 'It stands in the revisions and in the history.')} />
      </div>
      {wrong.length > 0 && (
        <Message
          tone="over"
          lead={`${wrong.length === 1 ? 'One field is' : `${wrong.length} fields are`} not whole.`}
          live="polite"
          className="mt-3"
        >
          They are marked above. A value and a sensitivity are figures, such as 1.5; a range is two frequencies.
        </Message>
      )}
      {problem?.status === 412 ? (
        <Message
          tone="inconclusive"
          lead="Somebody entered another revision since you opened this."
          live="polite"
          className="mt-3"
        >
          Yours is not entered; what you typed is still here.{' '}
          <button
            type="button"
            className="text-pen hover:underline"
            onClick={() => {
              clear();
              startLoading(() => router.refresh());
            }}
          >
            Load theirs
          </button>
          , then enter yours as the revision after it.
        </Message>
      ) : inBudget.length > 0 ? (
        <Message tone="over" lead="The budget was not entered." live="polite" className="mt-3">
          {inBudget.map(({ pointer, message }) => `${wordsOf(pointer)} ${message}.`).join(' ')}
        </Message>
      ) : (
        problem && problem.errors.length === 0 && <ProblemMessage problem={problem} className="mt-3" />
      )}
      <div className="mt-3 flex flex-wrap gap-2">
        <Button kind={live.below.length > 0 ? 'unavailable' : 'primary'} type="submit" busy={busy || loading}>
          {live.below.length > 0 ? 'Waits for a prescan not below the final' : `Enter revision ${next} of ${path.code}`}
        </Button>
        <Button kind="quiet" onClick={leave}>
          Leave it
        </Button>
      </div>
    </form>
  );
}

/** `/budget/final/0/contributions/3/name`: For a final, range 1, row 4, name. */
function wordsOf(pointer: string): string {
  const [, , purpose, range, , row, field] = pointer.split('/');
  const parts = [`For a ${purpose}`];
  if (range !== undefined) parts.push(`range ${Number(range) + 1}`);
  if (row !== undefined) parts.push(`row ${Number(row) + 1}`);
  if (field !== undefined) parts.push(field);
  return `${parts.join(', ')}:`;
}
