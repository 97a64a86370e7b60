import { VerdictGlyph } from '@/components/ui/VerdictGlyph';
import type { MarginSection } from '@/components/shell/marginSection';
import type { Verdict } from '@/schemas/common';
import type { ReceiverCheckView, ReceiverFindingView } from '@/schemas/receiver';
import { DETECTOR_WORDS } from '@/format/words';
import { partGroups, receiverSentence, receiverSources, receiverSummary } from './receiverWords';
import './receiver.css';

/** Settled under the line, for a person across it, not known dashed; a setting decides no verdict. */
const MARKS: Record<ReceiverFindingView['outcome'], Verdict> = {
  ok: 'under',
  fails: 'inconclusive',
  unknown: 'not-covered',
};
const MARK_WORDS = { ok: 'in order', fails: 'not in order', unknown: 'not known' };
const ORDER = { fails: 0, unknown: 1, ok: 2 };

/** How the run was read, against what its limits ask of a receiver. */
export function receiverSection(check: ReceiverCheckView): MarginSection {
  const summary = receiverSummary(check);
  return {
    id: 'receiver',
    title: 'Receiver',
    summary: check.counts.fails > 0 ? <span className="text-ochre">{summary}</span> : summary,
    children: <Receiver check={check} />,
  };
}

function Receiver({ check }: { check: ReceiverCheckView }) {
  const { traces } = check;
  return (
    <>
      {traces.map(({ index, name, detector, parts, whole }) => (
        <div key={index}>
          {traces.length > 1 && (
            <h3 className="font-semibold">
              {name.toLowerCase() === DETECTOR_WORDS[detector] ? name : `${name}, ${DETECTOR_WORDS[detector]}`}
            </h3>
          )}
          {partGroups(parts).map(({ heading, findings }) => (
            <div key={heading}>
              <p className="column-quiet">{heading}</p>
              <Findings findings={findings} />
            </div>
          ))}
          {whole.length > 0 && (
            <>
              <p className="column-quiet">whole run</p>
              <Findings findings={whole} />
            </>
          )}
        </div>
      ))}
      <p className="column-quiet mt-[22px]">
        The settings change no verdict by themselves. Against: {receiverSources(check).join('; ')}.
      </p>
    </>
  );
}

function Findings({ findings }: { findings: readonly ReceiverFindingView[] }) {
  const sorted = [...findings].sort((a, b) => ORDER[a.outcome] - ORDER[b.outcome]);
  return (
    <ul>
      {sorted.map((finding, i) => (
        <li
          key={i}
          title={finding.source}
          className={`receiver-finding ${finding.outcome === 'ok' ? '' : OUT[finding.outcome]}`}
        >
          <VerdictGlyph verdict={MARKS[finding.outcome]} label={MARK_WORDS[finding.outcome]} />
          <span>{receiverSentence(finding)}</span>
        </li>
      ))}
    </ul>
  );
}
const OUT = { fails: 'text-ochre', unknown: 'text-ink2' };
