'use client';

import { useRouter } from 'next/navigation';
import { useRef, useState, type FormEvent } from 'react';
import { ProblemMessage } from '@/components/forms/ProblemMessage';
import { send } from '@/components/forms/send';
import { useSubmit } from '@/components/forms/useSubmit';
import { useKey } from '@/components/shell/keys';
import { useSheet } from '@/components/shell/sheetState';
import { Button } from '@/components/ui/Button';
import { KeyHint } from '@/components/ui/KeyHint';
import { CheckField } from '@/components/ui/CheckField';
import { AreaField } from '@/components/ui/Field';
import { formatDayTime } from '@/format/dates';
import type { NoteView } from '@/schemas/note';
import './notes.css';

export interface NotesPage {
  items: NoteView[];
  next: string | null;
}

export type About = { jobId: string } | { sampleId: string } | { sweepId: string };

const CREATE = { method: 'POST', path: '/api/notes' } as const;

/** Pen italic with name and time below; `N` puts the cursor into a new one. */
export function Notes({ about, first, zone, lab }: { about: About; first: NotesPage; zone: string; lab: boolean }) {
  const router = useRouter();
  const { submit, busy, problem, fieldErrors } = useSubmit<object, NoteView>(CREATE);
  const [writing, setWriting] = useState(false);
  const [text, setText] = useState('');
  const [shared, setShared] = useState(false);
  const [older, setOlder] = useState<NotesPage>({ items: [], next: first.next });
  const opener = useRef<HTMLButtonElement>(null);
  const sheet = useSheet();
  // The part may be folded, or in a drawer that is put away.
  useKey(
    'N',
    () => {
      sheet.open('notes');
      setWriting(true);
    },
    { says: 'write a note' },
  );
  useKey('Escape', () => stop(), { when: writing });

  function stop() {
    setWriting(false);
    setTimeout(() => opener.current?.focus(), 0);
  }
  async function write(event: FormEvent) {
    event.preventDefault();
    const answer = await submit({ ...about, text, audience: shared || !lab ? 'client' : 'lab' });
    if (!answer.ok) return;
    setText('');
    router.refresh();
    stop();
  }
  async function more() {
    const query = new URLSearchParams({ ...about, after: older.next! });
    const answer = await send<NotesPage>({ method: 'GET', path: `/api/notes?${query}` }, undefined, {});
    if (answer.ok) setOlder({ items: [...older.items, ...answer.reply.items], next: answer.reply.next });
  }

  return (
    <>
      {writing ? (
        <form onSubmit={write} noValidate aria-label="Write a note" className="grid gap-2 pb-2">
          <AreaField
            label="Note"
            rows={3}
            maxLength={2000}
            autoFocus
            value={text}
            onChange={(event) => setText(event.target.value)}
            error={fieldErrors.text && `The note ${fieldErrors.text}.`}
            hint={lab ? undefined : 'The lab reads it. A note is not changed later.'}
          />
          {lab && (
            <CheckField
              label="The client’s designers read it too"
              checked={shared}
              onChange={(event) => setShared(event.target.checked)}
            />
          )}
          {problem && problem.errors.length === 0 && <ProblemMessage problem={problem} />}
          <div className="flex flex-wrap gap-2">
            <Button kind="primary" size="table" type="submit" busy={busy}>
              {shared || !lab ? 'Write it for both sides' : 'Write it for the lab'}
            </Button>
            <Button kind="quiet" size="table" onClick={stop}>
              Leave it
            </Button>
          </div>
        </form>
      ) : (
        <button ref={opener} type="button" className="note-opener" onClick={() => setWriting(true)}>
          Write a note <KeyHint name="N" />
        </button>
      )}
      <ol>
        {[...first.items, ...older.items].map((note) => (
          <li key={note.id}>
            <p className="column-note whitespace-pre-line">{note.text}</p>
            <p className="column-quiet">
              {note.by}
              {note.from && `, ${note.from}`}, {formatDayTime(note.at, zone)}
              {lab && note.audience === 'client' && !note.from && ', for the client too'}
            </p>
          </li>
        ))}
      </ol>
      {older.next && (
        <button type="button" className="text-pen" onClick={() => void more()}>
          Older notes
        </button>
      )}
    </>
  );
}
