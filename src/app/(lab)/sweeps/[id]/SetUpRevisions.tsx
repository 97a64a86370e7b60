'use client';

import { useState } from 'react';
import { ProblemMessage } from '@/components/forms/ProblemMessage';
import type { Problem } from '@/components/forms/problem';
import { send } from '@/components/forms/send';
import { formatDayTime } from '@/format/dates';
import type { SetupRecordView } from '@/schemas/setup';
import { SetUpFacts } from './SetUpFacts';

interface Page {
  items: SetupRecordView[];
  next: string | null;
}

/** Earlier records of the set-up, asked for when somebody wants them. */
export function SetUpRevisions({ runId, before, zone }: { runId: string; before: number; zone: string }) {
  const [page, setPage] = useState<Page | null>(null);
  const [problem, setProblem] = useState<Problem | null>(null);
  const [busy, setBusy] = useState(false);
  const earlier = before - 1;

  async function load() {
    setBusy(true);
    const query = new URLSearchParams({ limit: '20', ...(page?.next && { after: page.next }) });
    const path = `/api/sweeps/${runId}/setup/revisions?${query}`;
    const answer = await send<Page>({ method: 'GET', path }, undefined, {});
    setBusy(false);
    setProblem(answer.ok ? null : answer.problem);
    if (answer.ok) setPage({ items: [...(page?.items ?? []), ...answer.reply.items], next: answer.reply.next });
  }

  return (
    <>
      {page && (
        <ol className="mt-[22px]">
          {page.items
            .filter(({ revision }) => revision < before)
            .map((record) => (
              <li key={record.revision} className="mb-[22px]">
                <span className="column-line">
                  <span>Revision {record.revision}</span>
                  <span>{formatDayTime(record.at, zone)}</span>
                </span>
                <SetUpFacts record={record} />
                <span className="column-quiet block">
                  {record.by.name}
                  {record.reason && `: ${record.reason}`}
                </span>
              </li>
            ))}
        </ol>
      )}
      {problem && <ProblemMessage problem={problem} />}
      {(page === null || page.next) && (
        <p>
          <button type="button" className="setup-more" aria-busy={busy} onClick={() => void load()}>
            {earlier === 1 ? 'Show the earlier revision' : `Show ${earlier} earlier revisions`}
          </button>
        </p>
      )}
    </>
  );
}
