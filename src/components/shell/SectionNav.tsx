'use client';

import Link from 'next/link';
import { usePathname } from 'next/navigation';
import { classes } from '@/components/ui/classes';

export interface Section {
  href: string;
  name: string;
  /** Other beginnings of a path that belong to this section. */
  also?: readonly string[];
  /** What waits there: `decide` crosses the line in ochre, `act` stands above it in madder; `says` is `2 to decide`. */
  waiting?: { state: 'decide' | 'act'; count: number; says: string };
  /** Shown beside Menu on a phone. */
  onPhone?: boolean;
}

/** Whether a path lies in a section: its own page or anything below it. */
export function isIn(section: Pick<Section, 'href' | 'also'>, pathname: string): boolean {
  return [section.href, ...(section.also ?? [])].some(
    (start) => pathname === start || pathname.startsWith(`${start}/`),
  );
}

/** Section names hang on ticks; the current one carries a square. `listed` is the same as rows, for the phone menu. */
export function SectionNav({ sections, listed = false }: { sections: readonly Section[]; listed?: boolean }) {
  const pathname = usePathname();
  return (
    <nav className={listed ? 'top-list' : 'top-nav'} aria-label="Sections">
      <ul>
        {sections.map((section) => (
          <li key={section.href}>
            <SectionLink section={section} current={isIn(section, pathname)} />
          </li>
        ))}
      </ul>
    </nav>
  );
}

function SectionLink({ section, current }: { section: Section; current: boolean }) {
  const { waiting } = section;
  return (
    <Link className="top-section" prefetch={false} href={section.href} aria-current={current ? 'page' : undefined}>
      <span className="top-section-name" data-word={section.name}>
        {section.name}
      </span>
      {waiting && waiting.count > 0 && (
        <>
          <span className={classes('top-waits', `top-waits-${waiting.state}`)} aria-hidden>
            {waiting.count}
          </span>
          <span className="sr-only">, {waiting.says}</span>
        </>
      )}
    </Link>
  );
}

/** The one section a phone shows beside its menu, unless it is where the reader is. */
export function PhoneSections({ sections }: { sections: readonly Section[] }) {
  const pathname = usePathname();
  const shown = sections.find((section) => section.onPhone && !isIn(section, pathname));
  return shown ? (
    <Link className="top-quiet" prefetch={false} href={shown.href}>
      {shown.name}
    </Link>
  ) : null;
}
