import type { ReactNode } from 'react';
import Link from 'next/link';
import { cookies } from 'next/headers';
import { requireActor } from '@/app/requireActor';
import { SignOutButton } from './SignOutButton';
import { ROOM_COOKIE, roomOf } from '@/components/shell/room';
import type { Section } from '@/components/shell/SectionNav';
import { TopLine } from '@/components/shell/TopLine';
import { lettersShown } from '@/services/mailbox';
import { waitingRetests } from '@/services/openRetests';
import { listProducts } from '@/services/products';
import type { Actor } from '@/auth/actor';

const LAB_SECTIONS: Section[] = [
  { href: '/day', name: 'Day' },
  { href: '/jobs', name: 'Jobs', also: ['/samples', '/products'] },
  { href: '/sweeps', name: 'Sweeps', onPhone: true },
  { href: '/equipment', name: 'Equipment', also: ['/limits', '/paths'] },
];

/** What is over stands above the line; what only needs a final, or a prescan again, lies across it. */
async function retestSection(actor: Actor): Promise<Section> {
  const { over, 'needs-final': finals, 'repeat-prescan': repeats } = await waitingRetests(actor);
  const count = over + finals + repeats;
  const says = over > 0 ? `${count} waiting, ${over} of them over` : `${count} waiting`;
  return { href: '/retests', name: 'Retests', waiting: { state: over > 0 ? 'act' : 'decide', count, says } };
}

/** A designer's sections are their own products; beyond five the rest stand on the products sheet. */
async function sectionsOf(actor: Actor): Promise<Section[]> {
  if (actor.role !== 'designer') {
    const retests = await retestSection(actor);
    const sections = LAB_SECTIONS.flatMap((section) => (section.href === '/sweeps' ? [section, retests] : [section]));
    return actor.role === 'manager' ? [...sections, { href: '/people', name: 'People' }] : sections;
  }
  const { items, next } = await listProducts(actor, { limit: 5 });
  const products = items.map(({ id, code }) => ({ href: `/products/${id}`, name: code }));
  return [
    ...products,
    ...(next ? [{ href: '/products', name: 'All products' }] : []),
    { href: '/sweeps', name: 'Runs', onPhone: true },
  ];
}

/** Everything behind the sign-in: the top line and, under it, one sheet. */
export default async function LabLayout({ children }: { children: ReactNode }) {
  const actor = await requireActor();
  const room = roomOf((await cookies()).get(ROOM_COOKIE)?.value);
  const part = actor.role === 'designer' ? actor.organisationName : actor.role;
  return (
    <>
      <TopLine
        sections={await sectionsOf(actor)}
        person={{ name: actor.name, part }}
        findHref="/find"
        room={room}
        menu={
          <>
            <Link href="/calculator">Calculator</Link>
            <Link href="/account">Your account</Link>
            {lettersShown() && <Link href="/letters">Letters of the demo</Link>}
            <SignOutButton />
          </>
        }
      />
      {children}
    </>
  );
}
