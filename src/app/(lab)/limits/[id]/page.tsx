import type { Metadata } from 'next';
import Link from 'next/link';
import { found } from '@/app/found';
import { requireActor } from '@/app/requireActor';
import { mayRole } from '@/auth/permissions';
import { LimitChart } from '@/components/charts/LimitChart';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { ButtonLink } from '@/components/ui/Button';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { formatDay } from '@/format/dates';
import { differenceWords } from '@/format/revisions';
import { capitalised } from '@/format/words';
import { labZone } from '@/services/lab';
import { readLimitLine } from '@/services/limitLines';
import { basisVerdict, lineConditions, lineRange } from '../limitWords';
import { LineRevisions } from './LineRevisions';
import { lineSections } from './lineSections';
import { SegmentTable } from './SegmentTable';

interface Props {
  params: Promise<{ id: string }>;
}

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  return { title: (await found(readLimitLine(await requireActor(), (await params).id))).name };
}

/** One revision of a limit line beside the one before, with its source, its sets, its runs and every other revision. */
export default async function LimitLinePage({ params }: Props) {
  const actor = await requireActor();
  const line = await found(readLimitLine(actor, (await params).id));
  const zone = await labZone();
  const before = line.revisions.find(({ id }) => id === line.before?.id) ?? null;
  const newest = line.revisions[0]!;
  const manager = mayRole(actor.role, 'limit.enter');
  return (
    <Sheet
      header={
        <SheetHeader
          title={line.name}
          identity={
            <>
              <Link href="/limits" className="text-pen">
                Limits
              </Link>
              <span>{lineConditions(line)}</span>
              <span>revision {line.revision}</span>
            </>
          }
          finding={{
            verdict: basisVerdict(line.basis),
            children:
              line.basis === 'verified'
                ? `Verified against ${line.source}.`
                : `The figures are ${line.basis}: check them against ${line.document} before you rely on them.`,
          }}
          actions={
            manager && (
              <ButtonLink kind="primary" keyName="U" href={`/limits/new?revises=${newest.id}`}>
                Upload revision {newest.revision + 1}
              </ButtonLink>
            )
          }
        />
      }
      margin={lineSections(line, zone)}
      marginLine={`${line.name}, revision ${line.revision}`}
      keys={manager ? [{ keys: ['U'], does: 'upload' }] : undefined}
    >
      {!line.newest && (
        <p className="t-text mt-3">
          An earlier revision; the newest is{' '}
          <Link href={`/limits/${newest.id}`} className="text-pen underline">
            revision {newest.revision}
          </Link>
          .
        </p>
      )}
      <SectionHeading className="mt-4" remark={lineRange(line)}>
        The line
      </SectionHeading>
      <div className="mt-3">
        <LimitChart
          unit={line.unit}
          after={{ name: `revision ${line.revision}`, segments: line.segments }}
          before={
            before && {
              name: `revision ${before.revision}, entered ${formatDay(before.enteredAt, zone)}`,
              segments: before.segments,
            }
          }
          difference={line.before?.difference ?? null}
        />
      </div>
      {line.before && (
        <p className="t-text mt-2">
          {capitalised(differenceWords(line.before.difference, `revision ${line.before.revision}`))}.
        </p>
      )}
      <SegmentTable segments={line.segments} unit={line.unit} name={`${line.name}, revision ${line.revision}`} />
      <LineRevisions revisions={line.revisions} chosenId={line.id} zone={zone} />
    </Sheet>
  );
}
