'use client';

import { LimitChart } from '@/components/charts/LimitChart';
import { Message } from '@/components/ui/Message';
import { SectionHeading } from '@/components/ui/SectionHeading';
import type { LineUnit } from '@/schemas/common';
import { formatDay } from '@/format/dates';
import { formatFrequencyRange } from '@/format/frequencies';
import { differenceWords, formatEdge } from '@/format/revisions';
import { capitalised } from '@/format/words';
import type { LimitLinePreview } from '@/schemas/tables';
import { lineRange } from '../limitWords';

interface Props {
  preview: LimitLinePreview | null;
  unit: LineUnit | null;
  zone: string;
}

/** The line as it would be entered beside the revision before, and what is worth a look. */
export function LinePreviewed({ preview, unit, zone }: Props) {
  const segments = preview?.segments ?? null;
  const before = preview?.before ?? null;
  if (!segments || !preview)
    return (
      <>
        <SectionHeading className="mt-1">As it will be drawn</SectionHeading>
        <p className="t-text mt-1 text-ink2">The chart waits for what is still to say.</p>
      </>
    );
  return (
    <section aria-label="As it will be drawn">
      <SectionHeading className="mt-1" remark={lineRange({ segments })}>
        As it will be drawn
      </SectionHeading>
      {before && <Narrower segments={segments} before={before} />}
      <div className="mt-3">
        <LimitChart
          unit={unit}
          after={{
            name: before ? `revision ${before.revision + 1}, as it would be entered` : 'as it would be entered',
            segments,
          }}
          before={
            before && {
              name: `revision ${before.revision}, entered ${formatDay(before.enteredAt, zone)}`,
              segments: before.segments,
            }
          }
          difference={before?.difference ?? null}
        />
      </div>
      <p className="t-text mt-2" aria-live="polite">
        {before && (
          <>
            <b>{capitalised(differenceWords(before.difference, `revision ${before.revision}`))}.</b>{' '}
          </>
        )}
        Where two segments share a frequency the lower limit governs on it; outside the line there is no limit.
      </p>
      {preview.holes.length > 0 && (
        <ul className="t-text mt-2 list-disc pl-5 text-ink2">
          {preview.holes.map(({ fromHz, toHz, kind }) => (
            <li key={`${fromHz} ${toHz}`}>
              {kind === 'hole'
                ? `Between ${formatEdge(fromHz)} and ${formatEdge(toHz)} there is no limit.`
                : `Over ${formatFrequencyRange(fromHz, toHz)} two segments give a limit; the lower governs.`}
            </li>
          ))}
        </ul>
      )}
    </section>
  );
}

type Segments = NonNullable<LimitLinePreview['segments']>;
const ends = (segments: Segments) => [
  Math.min(...segments.map(({ startHz }) => startHz)),
  Math.max(...segments.map(({ stopHz }) => stopHz)),
] as const; // prettier-ignore

/** Frequencies that had a limit and would have none. */
function Narrower({ segments, before }: { segments: Segments; before: NonNullable<LimitLinePreview['before']> }) {
  const [first, last] = ends(segments);
  const [was, reached] = ends(before.segments);
  return (
    <>
      {last < reached && (
        <Message
          tone="inconclusive"
          className="mt-2"
          lead={`From now on nothing above ${formatEdge(last)} has a limit; the revision before reached ${formatEdge(reached)}.`}
        />
      )}
      {first > was && (
        <Message
          tone="inconclusive"
          className="mt-2"
          lead={`From now on nothing below ${formatEdge(first)} has a limit; the revision before began at ${formatEdge(was)}.`}
        />
      )}
    </>
  );
}
