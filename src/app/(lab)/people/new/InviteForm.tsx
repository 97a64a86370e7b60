'use client';

import { useState, type FormEvent } from 'react';
import { useRouter } from 'next/navigation';
import { ProblemMessage } from '@/components/forms/ProblemMessage';
import { useSubmit } from '@/components/forms/useSubmit';
import { Button, ButtonLink } from '@/components/ui/Button';
import { Field, SelectField } from '@/components/ui/Field';
import { Message } from '@/components/ui/Message';
import { Switch } from '@/components/ui/Switch';
import { showToast } from '@/components/ui/Toast';
import type { OrganisationChoice } from '../organisations';
import { WRITES } from '../writes';

interface Props {
  choices: readonly OrganisationChoice[];
  chosen: string;
  /** No mail server: the invitation waits in the queue. */
  mailWaits: boolean;
}

interface Body {
  name: string;
  email: string;
  role: 'manager' | 'technician' | 'designer';
  organisationId?: string;
  newClient?: string;
}

/** A person of the lab or of a client that is known or new; whose they are decides which role they can have. */
export function InviteForm({ choices, chosen, mailWaits }: Props) {
  const router = useRouter();
  const { submit, busy, problem, fieldErrors } = useSubmit<Body, { id: string }>(WRITES.invitePerson);
  const [from, setFrom] = useState<'known' | 'new'>('known');
  const [organisationId, setOrganisation] = useState(chosen);
  const [newClient, setNewClient] = useState('');
  const [labRole, setLabRole] = useState<'technician' | 'manager'>('technician');
  const [name, setName] = useState('');
  const [email, setEmail] = useState('');
  const [missing, setMissing] = useState<string | undefined>();
  const [leaving, setLeaving] = useState(false);
  const ofLab = from === 'known' && choices.find(({ id }) => id === organisationId)?.kind === 'lab';

  async function invite(event: FormEvent) {
    event.preventDefault();
    const unchosen = from === 'known' && !organisationId ? 'Choose whose person this is.' : undefined;
    setMissing(unchosen);
    if (unchosen) return;
    const body: Body = { name, email, role: ofLab ? labRole : 'designer' };
    const answer = await submit({ ...body, ...(from === 'known' ? { organisationId } : { newClient }) });
    if (!answer.ok) return;
    setLeaving(true);
    showToast({ text: `${name.trim()} is invited` });
    router.push(`/people/${answer.reply.id}`);
  }

  return (
    <form onSubmit={invite} noValidate className="mt-4 grid max-w-[36rem] gap-4" aria-label="Invite a person">
      {mailWaits && (
        <Message tone="inconclusive" lead="No mail server is configured.">
          The invitation waits until SMTP_URL is set on the lab’s server; its 7 days count from now.
        </Message>
      )}
      <Switch
        legend="Organisation"
        shown
        value={from}
        onChange={setFrom}
        choices={[
          { value: 'known', word: 'Known' },
          { value: 'new', word: 'New client' },
        ]}
      />
      {from === 'known' ? (
        <SelectField
          label="Whose person this is"
          value={organisationId}
          onChange={(event) => setOrganisation(event.target.value)}
          error={missing ?? (fieldErrors.organisationId && `The organisation ${fieldErrors.organisationId}.`)}
        >
          <option value="">choose</option>
          {choices.map(({ id, name: of, kind }) => (
            <option key={id} value={id}>
              {kind === 'lab' ? `${of}, the lab` : of}
            </option>
          ))}
        </SelectField>
      ) : (
        <Field
          label="Name of the client"
          autoComplete="off"
          value={newClient}
          onChange={(event) => setNewClient(event.target.value)}
          error={fieldErrors.newClient && `This name ${fieldErrors.newClient}.`}
        />
      )}
      {ofLab ? (
        <Switch
          legend="Role"
          shown
          value={labRole}
          onChange={setLabRole}
          choices={[
            { value: 'technician', word: 'Technician' },
            { value: 'manager', word: 'Manager' },
          ]}
          hint="A technician measures; a manager also enters equipment, limits, bookings and people."
          error={fieldErrors.role && `The role ${fieldErrors.role}.`}
        />
      ) : (
        (from === 'new' || organisationId) && (
          <p className="t-text">
            As designer: sees this client’s products, runs and reports, and no other organisation’s.
          </p>
        )
      )}
      <Field
        label="Name"
        name="name"
        autoComplete="off"
        value={name}
        onChange={(event) => setName(event.target.value)}
        error={fieldErrors.name && `The name ${fieldErrors.name}.`}
      />
      <Field
        label="Work e-mail"
        name="email"
        type="email"
        autoComplete="off"
        autoCapitalize="none"
        spellCheck={false}
        value={email}
        onChange={(event) => setEmail(event.target.value)}
        hint="The invitation goes there, and it is what they sign in with."
        error={fieldErrors.email && `The e-mail ${fieldErrors.email}.`}
      />
      {problem && problem.errors.length === 0 && <ProblemMessage problem={problem} />}
      <div className="flex flex-wrap gap-2">
        <Button kind="primary" type="submit" busy={busy || leaving}>
          Enter them and send the invitation
        </Button>
        <ButtonLink kind="quiet" href="/people">
          Leave it
        </ButtonLink>
      </div>
    </form>
  );
}
