'use client';

import { ProblemMessage } from '@/components/forms/ProblemMessage';
import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { Message } from '@/components/ui/Message';
import { formatBytes } from '@/format/quantities';
import type { Chosen, usePhotoQueue } from './usePhotoQueue';

type Queue = ReturnType<typeof usePhotoQueue>;

/** What is chosen and not yet kept: look at it, name it, send it. */
export function PhotoQueue({ queue, busy, change, remove, sendAll, halt }: Queue) {
  if (queue.length === 0) return null;
  const count = queue.length === 1 ? '1 photograph' : `${queue.length} photographs`;
  const again = queue.some(({ state }) => state === 'failed');
  return (
    <>
      <Message tone="inconclusive" lead="Check that no other client’s sample is in the picture," className="mt-[22px]">
        and no person who does not want to be. The client of this run sees it. Place, time and device are removed.
      </Message>
      <ul className="photo-queue">
        {queue.map((item, at) => (
          <li key={item.key}>
            {/* A picture of this device; nothing to optimise. */}
            {/* eslint-disable-next-line @next/next/no-img-element */}
            <img src={item.preview} alt={item.caption || `Photograph ${at + 1}, not sent yet`} />
            <div className="grid gap-1">
              <Field
                label={`Caption of photograph ${at + 1}`}
                value={item.caption}
                maxLength={200}
                autoComplete="off"
                disabled={item.state === 'sending'}
                onChange={(event) => change(item.key, { caption: event.target.value })}
              />
              <PhotoState item={item} />
              {!busy && (
                <Button kind="quiet" size="table" className="justify-self-start" onClick={() => remove(item.key)}>
                  Leave out<span className="sr-only"> photograph {at + 1}</span>
                </Button>
              )}
            </div>
            {item.problem && (
              <div className="col-span-2">
                <ProblemMessage problem={fileProblem(item)} />
              </div>
            )}
          </li>
        ))}
      </ul>
      <div className="photo-acts">
        <Button kind="primary" size="table" busy={busy} onClick={() => void sendAll()}>
          {busy ? `Sending ${count}` : again ? `Send ${count} again` : `Keep ${count}`}
        </Button>
        {busy && (
          <Button kind="quiet" size="table" onClick={halt}>
            Stop
          </Button>
        )}
      </div>
    </>
  );
}

function PhotoState({ item: { state, share, file } }: { item: Chosen }) {
  if (state !== 'sending') return <span className="column-quiet">{formatBytes(file.size)}</span>;
  const whole = share >= 1;
  return (
    <>
      <span className="column-quiet" role="status">
        {whole ? 'Opening it' : `Sending ${formatBytes(file.size)}`}
      </span>
      <progress max={1} value={whole ? undefined : share} aria-label="Sent" />
    </>
  );
}

/** What the server says of the file belongs to this picture, not to a field. */
function fileProblem({ problem, file }: Chosen) {
  const issue = problem!.errors.find(({ pointer }) => pointer === '/file');
  return issue ? { ...problem!, title: `${file.name} ${issue.message}.`, detail: null, errors: [] } : problem;
}
