import type { Metadata } from 'next';
import Link from 'next/link';
import { requireActor } from '@/app/requireActor';
import { asked, listed, type Search } from '@/app/(lab)/jobs/listed';
import { findPanes } from '@/components/calculator/panes';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { EmptyLine } from '@/components/ui/EmptyLine';
import { Pager } from '@/components/ui/Pager';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { formatCount } from '@/format/quantities';
import { foundKind, type Found, type FoundKind } from '@/schemas/find';
import { findEverywhere } from '@/services/find';
import { FindField } from './FindField';

export const metadata: Metadata = { title: 'Find' };

const KINDS: Readonly<Record<FoundKind, { many: string; href: (id: string) => string }>> = {
  job: { many: 'Jobs', href: (id) => `/jobs/${id}` },
  sample: { many: 'Samples', href: (id) => `/samples/${id}` },
  run: { many: 'Runs', href: (id) => `/sweeps/${id}` },
  product: { many: 'Products', href: (id) => `/products/${id}` },
  equipment: { many: 'Equipment', href: (id) => `/equipment/${id}` },
  path: { many: 'Signal paths', href: (id) => `/paths/${id}` },
};

/** `/` from anywhere: one field over every number and word the reader may see. */
export default async function FindPage({ searchParams }: { searchParams: Search }) {
  const actor = await requireActor();
  const q = ((await asked(searchParams, 'q')) ?? '').trim().slice(0, 120);
  const kind = foundKind.safeParse(await asked(searchParams, 'kind')).data;
  const after = await asked(searchParams, 'after');
  const found: Found | null = q ? await listed(findEverywhere(actor, { q, kind, after, limit: 50 })) : null;
  const here = (more: Record<string, string>) => `/find?${new URLSearchParams({ q, ...more })}`;
  const filled = found?.kinds.filter(({ items }) => items.length > 0) ?? [];
  const calculations = kind || after ? [] : findPanes(q);
  return (
    <Sheet header={<SheetHeader title="Find" />}>
      <FindField key={q} q={q} lab={actor.role !== 'designer'} />
      <p className="sr-only" role="status">
        {found &&
          (filled.length + calculations.length === 0
            ? `Nothing carries ${q}.`
            : `Found in ${[...filled.map(({ kind }) => KINDS[kind].many), ...(calculations.length > 0 ? ['Calculator'] : [])].join(', ')}.`)}
      </p>
      {found && filled.length + calculations.length === 0 && (
        <EmptyLine lead={`Nothing carries “${q}”.`} className="mt-4">
          Fewer words find more: part of a number, a serial or a product code is enough.
        </EmptyLine>
      )}
      {filled.map(({ kind: one, items, next }) => (
        <section key={one} className="mt-5">
          <SectionHeading
            remark={
              next && !kind ? (
                <Link prefetch={false} href={here({ kind: one })}>
                  All that match
                </Link>
              ) : kind ? (
                <Link prefetch={false} href={here({})}>
                  Every kind
                </Link>
              ) : undefined
            }
          >
            {KINDS[one].many}
          </SectionHeading>
          <ul>
            {items.map((item) => (
              <li key={item.id} className="border-b border-rule">
                <Link prefetch={false} href={KINDS[one].href(item.id)} className="find-row">
                  <span className="t-id find-name">{item.name}</span>
                  <span className="find-says">{item.says}</span>
                </Link>
              </li>
            ))}
          </ul>
          {kind && (
            <Pager firstHref={after ? here({ kind }) : null} nextHref={next && here({ kind, after: next })}>
              {`${formatCount(items.length)} on this page, newest first`}
            </Pager>
          )}
        </section>
      ))}
      {calculations.length > 0 && (
        <section className="mt-5">
          <SectionHeading>Calculator</SectionHeading>
          <ul>
            {calculations.map(({ id, title, about }) => (
              <li key={id} className="border-b border-rule">
                <Link prefetch={false} href={`/calculator?pane=${id}`} className="find-row">
                  <span className="find-name">{title}</span>
                  <span className="find-says">{about}</span>
                </Link>
              </li>
            ))}
          </ul>
        </section>
      )}
    </Sheet>
  );
}
