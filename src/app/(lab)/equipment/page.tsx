import type { Metadata } from 'next';
import { requireActor } from '@/app/requireActor';
import { asked, listed, type Search } from '@/app/(lab)/jobs/listed';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { EmptyLine } from '@/components/ui/EmptyLine';
import { Pager } from '@/components/ui/Pager';
import { dayOf } from '@/format/dates';
import { formatCount } from '@/format/quantities';
import { listEquipment } from '@/services/equipment';
import { labZone } from '@/services/lab';
import { listLimitSets } from '@/services/limitSets';
import { listPaths } from '@/services/signalPaths';
import { FindWords } from '../limits/FindWords';
import { EquipmentSheet } from './EquipmentSheet';
import { equipmentFinding, mostUrgentFirst } from './equipmentWords';
import { LimitSets } from './LimitSets';
import { SignalPaths } from './SignalPaths';

export const metadata: Metadata = { title: 'Equipment' };

/** The lab's equipment, its signal paths and its limit sets; each list pages by its own cursor. A designer finds nothing here. */
export default async function EquipmentPage({ searchParams }: { searchParams: Search }) {
  const actor = await requireActor();
  const cursors = {
    after: await asked(searchParams, 'after'),
    find: await asked(searchParams, 'find'),
    paths: await asked(searchParams, 'paths'),
    limits: await asked(searchParams, 'limits'),
  };
  const equipment = await listed(listEquipment(actor, { limit: 50, after: cursors.after, find: cursors.find }));
  const paths = await listed(listPaths(actor, { limit: 20, after: cursors.paths }));
  const limits = await listed(listLimitSets(actor, { limit: 20, after: cursors.limits }));
  const today = dayOf(new Date(), await labZone());
  const items = [...equipment.items].sort(mostUrgentFirst);
  const inUse = items.filter(({ state }) => state === 'in-use').length;
  const to = (changed: Partial<typeof cursors>, anchor = '') => {
    const query = new URLSearchParams(
      Object.entries({ ...cursors, ...changed }).filter((pair): pair is [string, string] => Boolean(pair[1])),
    );
    return `/equipment${query.size > 0 ? `?${query}` : ''}${anchor}`;
  };
  return (
    <EquipmentSheet
      header={
        <>
          <SheetHeader
            title="Equipment"
            finding={
              cursors.find && items.length === 0
                ? { verdict: 'not-covered', children: `Nothing is found by “${cursors.find}”.` }
                : equipmentFinding(items, today)
            }
          />
          <FindWords
            action="/equipment"
            value={cursors.find ?? ''}
            label="Find an item: its number, or a word of the trade such as LISN"
          />
        </>
      }
      items={items}
      today={today}
    >
      {items.length === 0 && cursors.find && (
        <EmptyLine lead={`Nothing is found by “${cursors.find}”.`}>
          Try LISN, antenna, or the item’s own number.
        </EmptyLine>
      )}
      {items.length === 0 && !cursors.find && (
        <EmptyLine lead="No equipment is entered yet.">Factors and due dates come from it.</EmptyLine>
      )}
      <Pager
        firstHref={cursors.after ? to({ after: undefined }) : null}
        nextHref={equipment.next && to({ after: equipment.next })}
      >
        {items.length > 0 && `${formatCount(items.length)} items, ${formatCount(inUse)} in use`}
      </Pager>
      <SignalPaths
        paths={[...paths.items].sort((a, b) => a.code.localeCompare(b.code, 'en', { numeric: true }))}
        today={today}
        firstHref={cursors.paths ? to({ paths: undefined }, '#paths') : null}
        nextHref={paths.next && to({ paths: paths.next }, '#paths')}
      />
      <LimitSets
        sets={limits.items}
        firstHref={cursors.limits ? to({ limits: undefined }, '#limits') : null}
        nextHref={limits.next && to({ limits: limits.next }, '#limits')}
      />
    </EquipmentSheet>
  );
}
