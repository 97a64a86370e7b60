import type { Metadata } from 'next';
import Link from 'next/link';
import { cookies } from 'next/headers';
import { asked, listed, type Search } from '@/app/(lab)/jobs/listed';
import { ROOM_COOKIE, roomOf } from '@/components/shell/room';
import { RoomToggle } from '@/components/shell/RoomToggle';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { SkipLink } from '@/components/shell/SkipLink';
import { EmptyLine } from '@/components/ui/EmptyLine';
import { IdentityLine } from '@/components/ui/IdentityLine';
import { Pager } from '@/components/ui/Pager';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { formatDayTime } from '@/format/dates';
import { formatCount } from '@/format/quantities';
import { labZone } from '@/services/lab';
import { listLetters } from '@/services/mailbox';
import { LetterText } from './LetterText';

export const metadata: Metadata = { title: 'Letters' };

const LETTERS = 20;

/** The demo's e-mail, which goes nowhere. It needs no sign-in, because a reset is read by somebody signed out. */
export default async function LettersPage({ searchParams }: { searchParams: Search }) {
  const after = await asked(searchParams, 'after');
  const { items, next } = await listed(listLetters({ limit: LETTERS, after }));
  const zone = await labZone();
  const room = roomOf((await cookies()).get(ROOM_COOKIE)?.value);
  return (
    <>
      <header className="top">
        <SkipLink />
        <Link className="top-word" href="/">
          Stillfield
        </Link>
        <div className="top-side">
          <RoomToggle room={room} className="top-quiet" />
        </div>
        <div className="top-phone">
          <RoomToggle room={room} className="top-quiet" />
        </div>
      </header>
      <Sheet
        header={
          <SheetHeader
            title="Letters"
            identity={<span>Demo: e-mail is caught here and goes nowhere. Anybody who opens this page reads it.</span>}
          />
        }
      >
        {items.length === 0 && (
          <EmptyLine lead="No e-mail was caught yet.">
            <Link href="/forgotten-password">Ask for a new password</Link> and its link appears here.
          </EmptyLine>
        )}
        {items.map((letter) => (
          <article key={letter.id} aria-labelledby={`letter-${letter.id}`} className="pb-2">
            <SectionHeading className="mt-5" id={`letter-${letter.id}`} remark={formatDayTime(letter.at, zone)}>
              {letter.subject || 'No subject'}
            </SectionHeading>
            <IdentityLine>
              <span className="[overflow-wrap:anywhere]">to {letter.to}</span>
              <span className="[overflow-wrap:anywhere]">from {letter.from}</span>
            </IdentityLine>
            <LetterText text={letter.text} />
          </article>
        ))}
        <Pager firstHref={after ? '/letters' : null} nextHref={next && `/letters?after=${next}`}>
          {items.length > 0 &&
            `${formatCount(items.length)} ${items.length === 1 ? 'letter' : 'letters'}, newest first`}
        </Pager>
      </Sheet>
    </>
  );
}
