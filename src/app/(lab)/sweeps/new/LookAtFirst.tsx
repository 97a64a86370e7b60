import Link from 'next/link';
import { Button } from '@/components/ui/Button';
import { Message } from '@/components/ui/Message';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { formatDay } from '@/format/dates';
import { formatBandwidth } from '@/format/frequencies';
import { formatCount } from '@/format/quantities';
import type { PathView } from '@/schemas/bench';
import type { SweepFileView } from '@/schemas/sweepFile';
import { typedNumber } from './typedNumber';
import type { Draft } from './draftTypes';

interface Props {
  file: SweepFileView;
  draft: Draft;
  path: PathView | undefined;
  /** What was taken from the last file of this shape holds for this one too. */
  onHolds: () => void;
  /** Back from keeping a broken file in part. */
  onRefuse: () => void;
}

/** What is worth a look before keeping: questions, what the file says of itself, equipment dates, a repeat. */
export function LookAtFirst({ file, draft, path, onHolds, onRefuse }: Props) {
  const { recognition, repeats } = file;
  const { frequency } = recognition;
  const rbwHz = (typedNumber(draft.traces.find((trace) => trace.use)?.rbwKhz ?? '') ?? 0) * 1e3;
  const wide = rbwHz > 0 && frequency.stepHz > rbwHz / 2;
  const dated = path?.items.filter((item) => item.due !== 'in-date' && item.dueOn !== null) ?? [];
  return (
    <section className="mt-5">
      <SectionHeading>Look at first</SectionHeading>
      <div className="mt-2">
        {recognition.kind === 'factor-table' && (
          <Message tone="over" lead="This looks like a table of corrections, not a sweep.">
            Its figures are in dB, which cannot be judged against a limit. Tables are entered with their calibration.
          </Message>
        )}
        {draft.keepPartial && recognition.partial && (
          <Message
            tone="over"
            lead={`The file breaks off at line ${formatCount(recognition.partial.line)}; what stands before it is kept as partial.`}
          >
            What is over in it is over. Nothing of it is under, and it covers nothing of the port.{' '}
            <button type="button" className="text-pen underline max-pad:min-h-11" onClick={onRefuse}>
              Back to the line
            </button>
          </Message>
        )}
        {draft.asBefore && !draft.asBefore.holds && (
          <Message
            tone="inconclusive"
            lead={`Taken as in ${draft.asBefore.number}: ${draft.asBefore.took.join(', ')}.`}
          >
            The file states none of it; the last file of this shape was read so.
            <span className="mt-2 block">
              <Button size="table" onClick={onHolds}>
                It holds for this file
              </Button>
            </span>
          </Message>
        )}
        {recognition.questions
          .filter(({ key }) => ['frequencyUnit', 'centreHz', 'sweepIndex'].includes(key))
          .filter(({ key }) => (key === 'frequencyUnit' ? draft.frequencyUnit === '' : true))
          .filter(({ key }) => (key === 'sweepIndex' ? draft.sweepIndex === '' : true))
          .map((question) => (
            <Message key={question.key} tone="inconclusive" lead={question.text}>
              {question.proposal !== null && question.key === 'frequencyUnit'
                ? `${question.proposal} is likely.`
                : null}
            </Message>
          ))}
        {recognition.correctedFor.map(({ what, evidence, line }) => (
          <Message key={line} tone="inconclusive" lead={`Line ${line} says that its values hold ${what} already.`}>
            “{evidence}”. What is ticked under “already in the reading” is not added again.
          </Message>
        ))}
        {wide && (
          <Message
            tone="inconclusive"
            lead={`Step ${formatBandwidth(frequency.stepHz)} is wider than half the RBW (${formatBandwidth(rbwHz / 2)}).`}
          >
            A narrow peak may read low. Fine for a prescan; finals must be tuned.
          </Message>
        )}
        {dated.map((item) => (
          <Message
            key={item.identifier}
            tone={item.due === 'lapsed' ? 'over' : 'inconclusive'}
            lead={`${item.identifier} calibration ${item.due === 'lapsed' ? 'lapsed on' : 'is due on'} ${formatDay(item.dueOn!)}.`}
          >
            {item.due === 'lapsed' ? 'Choose another path, or have it calibrated first.' : 'This run is covered.'}
          </Message>
        ))}
        {recognition.remarks.map(({ text, line }) => (
          <Message key={text} tone="inconclusive" lead={line === null ? text : `Line ${line}: ${text}`} />
        ))}
        {repeats.length > 0 ? (
          <Message tone="inconclusive" lead="The same file was kept before.">
            {repeats.map((run, i) => (
              <span key={run.sweepId}>
                {i > 0 ? ', ' : 'See '}
                <Link href={`/sweeps/${run.sweepId}`}>{run.number}</Link>
              </span>
            ))}
            . Keeping it again makes another run.
          </Message>
        ) : (
          <Message tone="under" lead="Not a repeat:">
            no run has this file’s fingerprint.
          </Message>
        )}
      </div>
    </section>
  );
}
