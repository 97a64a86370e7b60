import type { Metadata } from 'next';
import Link from 'next/link';
import { requireActor } from '@/app/requireActor';
import { mayRole } from '@/auth/permissions';
import { listed, type Search } from '@/app/(lab)/jobs/listed';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { EmptyLine } from '@/components/ui/EmptyLine';
import { Pager } from '@/components/ui/Pager';
import { formatCount } from '@/format/quantities';
import { labZone } from '@/services/lab';
import { listProducts } from '@/services/products';
import { listRetests } from '@/services/retests';
import { readSample } from '@/services/samples';
import { PrintButton } from './PrintButton';
import { PrintList } from './PrintList';
import { RetestFilters } from './RetestFilters';
import { addressOf, filtersOf, listAddress, readSearch } from './retestQuery';
import { RetestSheet } from './RetestSheet';
import { retestsFinding } from './retestWords';

export const metadata: Metadata = { title: 'Retests' };

/** As many as a day's work on a receiver; the rest is a page further. */
const ROWS = 100;

/** What waits for another look, as a queue that can be filtered, printed and taken to the receiver as a list. */
export default async function RetestsPage({ searchParams }: { searchParams: Search }) {
  const actor = await requireActor();
  const said = Object.fromEntries(
    Object.entries(await searchParams).map(([name, value]) => [name, Array.isArray(value) ? value[0] : value]),
  );
  const search = readSearch(said);
  const { items, next } = await listed(listRetests(actor, { limit: ROWS, after: said.after, ...filtersOf(search) }));
  const sample = search.sample ? await listed(readSample(actor, search.sample)) : null;
  const label = sample?.states.find(({ id }) => id === search.state)?.label;
  const products = await listProducts(actor, { limit: 200 });
  const whole = said.after === undefined && next === null;
  const measurable = items.filter(({ kind, status }) => kind !== 'repeat-prescan' && isToMeasure(status)).length;
  const emissions =
    search.status === 'open' ? measurable : items.filter(({ kind }) => kind !== 'repeat-prescan').length;
  return (
    <RetestSheet
      key={addressOf(search)}
      items={items}
      zone={await labZone()}
      change={mayRole(actor.role, 'retest.change')}
      header={
        <SheetHeader
          title="Retests"
          identity={
            (sample || search.run) && (
              <>
                <span>
                  only{' '}
                  {sample ? (
                    <Link href={`/samples/${sample.id}`}>
                      {[sample.code, label].filter(Boolean).join(' in ')}, {sample.product.name} {sample.product.code}
                    </Link>
                  ) : (
                    <Link href={`/sweeps/${search.run}`}>what one run asked for or settled</Link>
                  )}
                </span>
                <Link href="/retests">Show all</Link>
              </>
            )
          }
          finding={retestsFinding(items, whole)}
          actions={
            emissions > 0 && (
              <>
                <PrintButton />
                <a className="btn btn-primary" href={listAddress(search, 'csv')} download>
                  Take {formatCount(emissions)}
                  {whole ? '' : ' and more'} {emissions === 1 && whole ? 'frequency' : 'frequencies'}
                </a>
              </>
            )
          }
        />
      }
      filters={
        <RetestFilters search={search} products={products.items.map(({ id, code }) => ({ value: id, word: code }))} />
      }
    >
      {items.length === 0 && (
        <EmptyLine lead={search.status === 'open' ? 'Nothing waits for another look.' : 'No retest is like this.'}>
          A run that is over or needs a final opens one for each emission; choose All to see what was settled.
        </EmptyLine>
      )}
      <div className="retest-foot">
        <Pager firstHref={said.after ? addressOf(search) : null} nextHref={next && addressOf(search, { after: next })}>
          {items.length > 0 && (
            <>
              {formatCount(items.length)} {items.length === 1 ? 'retest' : 'retests'}
              {emissions > 0 && (
                <>
                  ; the frequencies also{' '}
                  <a href={listAddress(search, 'txt')} download className="underline">
                    as plain text
                  </a>
                </>
              )}
            </>
          )}
        </Pager>
      </div>
      <PrintList items={search.status === 'open' ? items.filter(({ status }) => isToMeasure(status)) : items} />
    </RetestSheet>
  );
}

/** What the list for the receiver holds of the open ones. */
function isToMeasure(status: string): boolean {
  return status === 'waiting' || status === 'scheduled';
}
