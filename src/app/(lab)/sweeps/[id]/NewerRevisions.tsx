'use client';

import { InPlace } from '@/app/(lab)/jobs/InPlace';
import { Message } from '@/components/ui/Message';
import { EvaluateForm } from './EvaluateForm';

/** Says what is newer than the revisions a run is judged by, and offers to judge it again. */
export function NewerRevisions({ id, number, newer }: { id: string; number: string; newer: readonly string[] }) {
  if (newer.length === 0) return null;
  const [first, ...rest] = newer;
  return (
    <div className="mb-3 print:hidden">
      <Message tone="inconclusive" lead={first}>
        {rest.join(' ')} What stands here is judged by the revisions before.
      </Message>
      <InPlace
        size="table"
        acts={[
          {
            id: 'evaluate',
            word: 'Re-evaluate',
            form: (close) => <EvaluateForm id={id} number={number} newer={newer} onClose={close} />,
          },
        ]}
      />
    </div>
  );
}
