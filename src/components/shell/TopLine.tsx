import type { ReactNode } from 'react';
import Link from 'next/link';
import { KeyHint } from '@/components/ui/KeyHint';
import { Hanging } from './Hanging';
import { KeysButton, KeysDialog } from './KeysDialog';
import { RoomToggle, type Room } from './RoomToggle';
import { PhoneSections, SectionNav, type Section } from './SectionNav';
import { SkipLink } from './SkipLink';

export interface TopLineProps {
  sections: readonly Section[];
  /** `Mira Solt, technician`; a designer's second part is the organisation. */
  person: { name: string; part: string };
  /** What the request's cookie says, so that server and browser agree. */
  room: Room;
  /** Where `/` leads; left out where there is nothing to find. */
  findHref?: string;
  /** What hangs under the person's name: links and the sign-out form. */
  menu?: ReactNode;
}

/** The page top: a line the whole page wide, with the wordmark and the section names hanging under it. */
export function TopLine({ sections, person, room, findHref, menu }: TopLineProps) {
  const name = `${person.name}, ${person.part}`;
  const find = findHref && (
    <Link className="top-quiet" prefetch={false} href={findHref} data-key="/" aria-keyshortcuts="/">
      Find <KeyHint name="/" />
    </Link>
  );
  return (
    <header className="top">
      <SkipLink />
      <Link className="top-word" prefetch={false} href="/">
        Stillfield
      </Link>
      <SectionNav sections={sections} />
      <div className="top-side">
        {find}
        <RoomToggle room={room} className="top-quiet" />
        <Hanging label={name} className="top-quiet" panelClassName="top-person">
          {menu}
          <KeysButton />
        </Hanging>
      </div>
      <div className="top-phone">
        <PhoneSections sections={sections} />
        <Hanging label="Menu" className="top-quiet" panelClassName="top-menu">
          <SectionNav sections={sections} listed />
          <div className="top-menu-rest">
            {find}
            <RoomToggle room={room} className="top-quiet" />
            <span className="top-name">{name}</span>
            {menu}
          </div>
        </Hanging>
      </div>
      <KeysDialog />
    </header>
  );
}
