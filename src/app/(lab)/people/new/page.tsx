import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { requireActor } from '@/app/requireActor';
import { asked, type Search } from '@/app/(lab)/jobs/listed';
import { mayRole } from '@/auth/permissions';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { whereMailGoes } from '@/services/mailbox';
import { organisationChoices } from '../organisations';
import { InviteForm } from './InviteForm';

export const metadata: Metadata = { title: 'Invite a person' };

/** `?of=` chooses the organisation. */
export default async function InvitePage({ searchParams }: { searchParams: Search }) {
  const actor = await requireActor();
  if (!mayRole(actor.role, 'user.create')) notFound();
  const choices = await organisationChoices(actor);
  const wanted = await asked(searchParams, 'of');
  return (
    <Sheet
      header={
        <SheetHeader
          title="Invite a person"
          identity={<span>They are e-mailed a link, valid 7 days, and choose their own password with it.</span>}
        />
      }
    >
      <InviteForm
        choices={choices}
        chosen={choices.some(({ id }) => id === wanted) ? wanted! : ''}
        mailWaits={whereMailGoes() === 'nowhere'}
      />
    </Sheet>
  );
}
