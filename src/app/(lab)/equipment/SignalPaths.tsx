import Link from 'next/link';
import { SignalPath } from '@/components/charts/SignalPath';
import { EmptyLine } from '@/components/ui/EmptyLine';
import { Pager } from '@/components/ui/Pager';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { formatFrequencyRange } from '@/format/frequencies';
import { PORT_METHODS, PORT_WORDS } from '@/format/words';
import type { PathView } from '@/schemas/bench';

interface Props {
  paths: readonly PathView[];
  today: string;
  firstHref: string | null;
  nextHref: string | null;
}

/** Each path as a line with one square per item, from the EUT to the receiver. */
export function SignalPaths({ paths, today, firstHref, nextHref }: Props) {
  return (
    <section aria-label="Signal paths" id="paths">
      <SectionHeading className="mt-6" remark="from the EUT to the receiver, current revisions">
        Signal paths
      </SectionHeading>
      {paths.length === 0 && (
        <EmptyLine lead="No signal path is entered yet.">
          A run without one adds no factor and concludes nothing.
        </EmptyLine>
      )}
      <ul>
        {paths.map((path) => (
          <li key={path.id} className="border-b border-rule pt-3 pb-3">
            <p className="flex flex-wrap items-baseline gap-x-[18px] text-ink2">
              <Link
                href={`/paths/${path.id}`}
                prefetch={false}
                className="t-id inline-flex items-center font-semibold text-pen hover:underline max-pad:min-h-11"
              >
                {path.code}
              </Link>
              <span className="text-ink">{path.name}</span>
              <span>
                {PORT_WORDS[path.port]}, {PORT_METHODS[path.port]}
              </span>
              <span>test position {path.position}</span>
              {path.lowHz !== null && path.highHz !== null && path.highHz > path.lowHz && (
                <span>
                  factors for <span className="t-figure">{formatFrequencyRange(path.lowHz, path.highHz)}</span>
                </span>
              )}
              <span>revision {path.revision}</span>
            </p>
            <div
              className="mt-2 overflow-x-auto [&>ol]:overflow-visible"
              role="region"
              aria-label={`Path ${path.code}`}
              tabIndex={0}
            >
              <SignalPath
                items={path.items}
                sample={{ name: 'EUT', where: `position ${path.position}` }}
                distanceM={null}
                today={today}
              />
            </div>
          </li>
        ))}
      </ul>
      <Pager firstHref={firstHref} nextHref={nextHref} />
    </section>
  );
}
