import Link from 'next/link';
import type { ReactNode } from 'react';
import type { MarginSection } from '@/components/shell/marginSection';
import { formatDayTime } from '@/format/dates';
import { formatCount } from '@/format/quantities';
import type { LimitLineRecord } from '@/schemas/tables';

/** Where one revision is from, and what names it. */
export function lineSections(line: LimitLineRecord, zone: string): MarginSection[] {
  return [
    {
      id: 'record',
      title: 'This revision',
      subject: String(line.revision),
      children: <LineRecord line={line} zone={zone} />,
    },
    {
      id: 'used',
      title: 'Used by',
      remark: line.runs.count === 1 ? '1 run' : `${formatCount(line.runs.count)} runs`,
      count: line.runs.count,
      children: <Uses line={line} />,
    },
  ];
}

function LineRecord({ line, zone }: { line: LimitLineRecord; zone: string }) {
  return (
    <>
      <dl className="column-pair">
        <Pair name="Document">{line.document}</Pair>
        <Pair name="Class">{line.class}</Pair>
        <Pair name="Port">{line.port}</Pair>
        <Pair name="Source">{line.source}</Pair>
        <Pair name="Basis">{line.basis}</Pair>
        <Pair name="Entered">
          {formatDayTime(line.enteredAt, zone)}
          {line.enteredBy && `, ${line.enteredBy.name}`}
        </Pair>
        {line.reason && <Pair name="Reason">{line.reason}</Pair>}
        {line.file && (
          <Pair name="File">
            {line.file.name}
            <span className="column-quiet block">SHA-256 {line.file.sha256.slice(0, 16)}…</span>
          </Pair>
        )}
      </dl>
      <p className="mt-[22px]">
        <a href={`/api/limit-lines/${line.id}/csv`} download className="text-pen underline">
          Download revision {line.revision} as CSV
        </a>
      </p>
    </>
  );
}

function Uses({ line: { sets, runs } }: { line: LimitLineRecord }) {
  return (
    <>
      {sets.length === 0 && <p className="column-quiet">No limit set names it.</p>}
      <ul>
        {sets.map(({ id, name, revision, withdrawnAt }) => (
          <li key={id}>
            {name}
            <span className="column-quiet block">
              revision {revision}, {withdrawnAt === null ? 'in use' : 'withdrawn'}
            </span>
          </li>
        ))}
      </ul>
      {runs.count === 0 ? (
        <p className="column-quiet">No run was judged with it.</p>
      ) : (
        <p>
          {runs.latest.map(({ id, number }, i) => (
            <span key={id}>
              {i > 0 && ', '}
              <Link href={`/sweeps/${id}`} className="t-id text-pen">
                {number}
              </Link>
            </span>
          ))}
          {runs.count > runs.latest.length && `, and ${formatCount(runs.count - runs.latest.length)} earlier`}
        </p>
      )}
    </>
  );
}

function Pair({ name, children }: { name: string; children: ReactNode }) {
  return (
    <>
      <dt>{name}</dt>
      <dd className="[overflow-wrap:anywhere]">{children}</dd>
    </>
  );
}
