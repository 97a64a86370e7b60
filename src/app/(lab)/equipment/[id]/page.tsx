import type { Metadata } from 'next';
import { found } from '@/app/found';
import { requireActor } from '@/app/requireActor';
import { asked, type Search } from '@/app/(lab)/jobs/listed';
import { historiesOf } from '@/app/(lab)/jobs/history';
import { historySection } from '@/app/(lab)/jobs/HistoryLines';
import { mayRole } from '@/auth/permissions';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { ButtonLink } from '@/components/ui/Button';
import { dayOf } from '@/format/dates';
import { listFactorTables, readFactorTable } from '@/services/factorTables';
import { readEquipment } from '@/services/equipment';
import { labZone } from '@/services/lab';
import { Calibrations } from '../Calibrations';
import { DUE_VERDICTS, dueWords, kindOf } from '../equipmentWords';
import { ChosenTable } from './ChosenTable';
import { TableRevisions } from './TableRevisions';
import { tableSections } from './tableSections';

interface Props {
  params: Promise<{ id: string }>;
  searchParams: Search;
}

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  const { identifier } = await found(readEquipment(await requireActor(), (await params).id));
  return { title: identifier };
}

/** One item: its calibrations, every revision of every table, and one of them drawn beside the one before. */
export default async function EquipmentItemPage({ params, searchParams }: Props) {
  const actor = await requireActor();
  const item = await found(readEquipment(actor, (await params).id));
  const after = await asked(searchParams, 'after');
  const listed = await found(listFactorTables(actor, { limit: 100, equipmentId: item.id, after }));
  const wanted = (await asked(searchParams, 'table')) ?? listed.items.find(({ newest }) => newest)?.id;
  const chosen = wanted ? await found(readFactorTable(actor, wanted)) : null;
  const before = chosen?.before ? await readFactorTable(actor, chosen.before.id) : null;
  const zone = await labZone();
  const today = dayOf(new Date(), zone);
  const history = await historiesOf(actor, [['equipment', item.id]]);
  const manager = mayRole(actor.role, 'equipment.enter');
  return (
    <Sheet
      header={
        <SheetHeader
          title={item.identifier}
          identity={
            <>
              <span>{kindOf(item.role)}</span>
              <span>{item.description}</span>
              {item.paths.length > 0 && (
                <span>
                  on {item.paths.length === 1 ? 'path' : 'paths'}{' '}
                  <span className="t-id">{item.paths.map(({ code }) => code).join(', ')}</span>
                </span>
              )}
            </>
          }
          finding={{ verdict: DUE_VERDICTS[item.due], children: `${item.identifier} is ${dueWords(item, today)}.` }}
          actions={
            manager && (
              <ButtonLink kind="primary" keyName="U" href={`/equipment/${item.id}/upload`}>
                Upload a factor table
              </ButtonLink>
            )
          }
        />
      }
      margin={[...tableSections(chosen, zone), ...(history.length > 0 ? [historySection(history, zone)] : [])]}
      marginLine={chosen ? `${chosen.name}, revision ${chosen.revision}` : item.identifier}
      keys={manager ? [{ keys: ['U'], does: 'upload' }] : undefined}
    >
      <Calibrations item={item} today={today} />
      {chosen && <ChosenTable table={chosen} before={before} zone={zone} />}
      <TableRevisions
        itemId={item.id}
        revisions={listed.items}
        chosenId={chosen?.id ?? null}
        zone={zone}
        firstHref={after ? `/equipment/${item.id}` : null}
        nextHref={listed.next && `/equipment/${item.id}?after=${listed.next}`}
        manager={manager}
      />
    </Sheet>
  );
}
