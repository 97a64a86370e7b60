'use client';

import dynamic from 'next/dynamic';
import Link from 'next/link';
import type { ComponentType } from 'react';
import type { ListGridProps } from './listColumns';
import { MoreLine } from './MoreLine';
import { usePhone } from './useWidths';

const ListTable = dynamic(() => import('./ListTable'), { ssr: false }) as unknown as ComponentType<
  ListGridProps<never>
>;

/** A list of records in the look of every table: a grid from 760 px on, two lines per record on a phone. */
export function ListGrid<Row>(props: ListGridProps<Row>) {
  const { label, noun, rows, rowId, href, compact, total = rows.length, empty, onMore, loading } = props;
  const phone = usePhone();
  return (
    <section aria-label={label}>
      {phone ? (
        <ul className="border-t border-rule">
          {rows.map((row) => (
            <li key={rowId(row)} className="border-b border-rule">
              <Link href={href(row)} className="block min-h-[2.875rem] py-2 text-ink hover:no-underline">
                {compact(row)}
              </Link>
            </li>
          ))}
        </ul>
      ) : (
        <ListTable {...(props as unknown as ListGridProps<never>)} />
      )}
      {rows.length === 0 && empty ? <div className="border-b border-rule py-2 text-ink2">{empty}</div> : null}
      <MoreLine shown={rows.length} total={total} noun={noun} onMore={onMore} loading={loading} />
    </section>
  );
}
