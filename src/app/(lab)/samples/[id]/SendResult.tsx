'use client';

import { useState, type FormEvent } from 'react';
import Link from 'next/link';
import { useRouter } from 'next/navigation';
import { InPlace } from '@/app/(lab)/jobs/InPlace';
import { ProblemMessage } from '@/components/forms/ProblemMessage';
import type { Submittable } from '@/components/forms/send';
import { useSubmit } from '@/components/forms/useSubmit';
import { useKey } from '@/components/shell/keys';
import { Button } from '@/components/ui/Button';
import { CheckField } from '@/components/ui/CheckField';
import { AreaField, FieldNotes, SelectField } from '@/components/ui/Field';
import { Message } from '@/components/ui/Message';
import { showToast } from '@/components/ui/Toast';
import type { ResultMailPreview } from '@/schemas/resultMail';

/** What this form sends; the schemas stay on the server, a test holds the two together. */
export const RESULT_MAIL_WRITES = {
  previewResultMail: { method: 'POST', path: '/api/result-mails/preview' },
  sendResultMail: { method: 'POST', path: '/api/result-mails' },
} as const satisfies Record<string, Submittable>;

interface Props {
  organisation: string;
  /** Measured states, newest first. */
  states: readonly { id: string; label: string; description: string }[];
  recipients: readonly { id: string; name: string }[];
  /** Then another one is `again`, as a new e-mail of its own. */
  sentBefore: boolean;
}

export function SendResult(props: Props) {
  if (props.recipients.length === 0) {
    return (
      <Message tone="inconclusive" lead={`No designer of ${props.organisation} can sign in yet.`} className="mt-3">
        A result goes to somebody who can open the sheet. <Link href="/people">Invite a designer</Link>
      </Message>
    );
  }
  const word = props.sentBefore ? 'Send a result again' : 'Send a result';
  return (
    <div className="mt-3">
      <InPlace acts={[{ id: 'send', word, form: (close) => <SendForm {...props} onClose={close} /> }]} />
    </div>
  );
}

function SendForm({ organisation, states, recipients, onClose }: Props & { onClose: () => void }) {
  const router = useRouter();
  const [stateId, setState] = useState(states[0]!.id);
  const [chosen, setChosen] = useState<string[]>(recipients.length === 1 ? [recipients[0]!.id] : []);
  const [note, setNote] = useState('');
  const [preview, setPreview] = useState<ResultMailPreview | null>(null);
  const look = useSubmit<object, ResultMailPreview>(RESULT_MAIL_WRITES.previewResultMail);
  const send = useSubmit<object, unknown>(RESULT_MAIL_WRITES.sendResultMail);
  useKey('Escape', onClose);

  const recipientIds = recipients.filter(({ id }) => chosen.includes(id)).map(({ id }) => id);
  const { recipientIds: none, ...others } = look.fieldErrors;
  const stranger = Object.entries(others).find(([field]) => field.startsWith('recipientIds/'))?.[1];
  const wrong = none ? `The e-mail ${none}.` : stranger && `One of them ${stranger}.`;

  async function lookAtIt(event: FormEvent) {
    event.preventDefault();
    const answer = await look.submit({ stateId, recipientIds, note });
    if (!answer.ok) return;
    send.clear();
    setPreview(answer.reply);
  }
  async function sendIt() {
    if (!preview) return;
    const answer = await send.submit({ stateId, recipientIds, note, digest: preview.digest });
    if (!answer.ok) return;
    router.refresh();
    showToast({ text: `The result is on its way to ${namesOf(preview)}` });
    onClose();
  }

  if (preview) {
    return (
      <section aria-label="The e-mail as it will be sent" className="grid max-w-[44rem] gap-3 py-3">
        <dl className="t-text grid grid-cols-[4.5rem_minmax(0,1fr)]">
          <dt className="text-ink2">To</dt>
          <dd>{preview.to.map(({ name, address }) => `${name}, ${address}`).join('; ')}</dd>
          <dt className="text-ink2">Subject</dt>
          <dd className="font-semibold">{preview.subject}</dd>
        </dl>
        <pre
          className="t-text border border-rule2 bg-margin p-4 font-sans whitespace-pre-wrap"
          aria-label="Words of the e-mail"
        >
          {preview.text}
        </pre>
        <p className="t-detail">
          Each designer gets a message of their own. The e-mail carries the same words as plain text and as HTML,
          without pictures; its link asks for a sign-in.
        </p>
        {send.problem && <ProblemMessage problem={send.problem} />}
        <div className="flex flex-wrap gap-2">
          <Button kind="primary" keyName="A" busy={send.busy} autoFocus onClick={() => void sendIt()}>
            {preview.to.length === 1
              ? `Approve and send to ${namesOf(preview)}`
              : `Approve and send to ${preview.to.length} designers`}
          </Button>
          <Button onClick={() => setPreview(null)}>Change it</Button>
          <Button kind="quiet" onClick={onClose}>
            Send nothing
          </Button>
        </div>
      </section>
    );
  }
  return (
    <form onSubmit={lookAtIt} noValidate className="grid max-w-[33rem] gap-3 py-3" aria-label="Send a result">
      <SelectField label="Result of state" autoFocus value={stateId} onChange={(event) => setState(event.target.value)}>
        {states.map(({ id, label, description }) => (
          <option key={id} value={id}>
            {label}, {description}
          </option>
        ))}
      </SelectField>
      <fieldset className="grid gap-1">
        <legend className="field-label">Designers of {organisation}</legend>
        {recipients.map(({ id, name }) => (
          <CheckField
            key={id}
            label={name}
            checked={chosen.includes(id)}
            onChange={(event) =>
              setChosen((before) => (event.target.checked ? [...before, id] : before.filter((one) => one !== id)))
            }
          />
        ))}
        <FieldNotes id="recipients" error={wrong} />
      </fieldset>
      <AreaField
        label="What you add, if anything"
        value={note}
        onChange={(event) => setNote(event.target.value)}
        hint="It stands under the finding, with your name."
        error={look.fieldErrors.note && `This ${look.fieldErrors.note}.`}
      />
      {look.problem && look.problem.errors.length === 0 && <ProblemMessage problem={look.problem} />}
      <div className="flex flex-wrap gap-2">
        <Button kind="primary" type="submit" busy={look.busy}>
          Look at the e-mail
        </Button>
        <Button kind="quiet" onClick={onClose}>
          Leave it
        </Button>
      </div>
    </form>
  );
}

const namesOf = ({ to }: ResultMailPreview) => to.map(({ name }) => name).join(', ');
