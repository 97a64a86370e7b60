import type { ReactNode } from 'react';
import type { SweepView } from '@/schemas/sweep';
import { formatDay, formatDayTime } from '@/format/dates';
import { formatBandwidth, formatFrequencyRange } from '@/format/frequencies';
import { formatBytes, formatUncertainty } from '@/format/quantities';
import { DETECTOR_WORDS } from '@/format/words';
import { RULE_NAMES, RULE_SAYS } from '@/format/decisionRules';

/** Where everything on this sheet comes from: file, settings, path, limits, uncertainty, decision rule, engine. */
export function Record({ sweep, zone }: { sweep: SweepView; zone: string }) {
  const { file, path, limitSet, evaluation, traces, remarks } = sweep;
  return (
    <dl className="column-pair">
      <Pair name="File">
        <a href={`/api/sweeps/${sweep.id}/file`} download>
          {file.name}
        </a>
        , {formatBytes(file.bytes)}, as it was sent
        <Quiet>SHA-256 {file.sha256.slice(0, 16)}…</Quiet>
      </Pair>
      <Pair name="Traces">
        {traces.map((trace) => (
          <span key={trace.index} className="block">
            {trace.name}: {DETECTOR_WORDS[trace.detector]},{' '}
            {trace.rbwHz === null ? 'RBW not stated' : `RBW ${formatBandwidth(trace.rbwHz)}`}
          </span>
        ))}
      </Pair>
      <Pair name="Mode">{sweep.operatingMode}</Pair>
      <Pair name="Kept">
        {formatDayTime(sweep.keptAt, zone)}, {sweep.by.name}
      </Pair>
      <Pair name="Values are">{sweep.valuesHold === 'field' ? 'field strength' : 'receiver input'}</Pair>
      {path ? (
        <Pair name="Path">
          {path.code} revision {path.revision}
          {path.items.map((item) => (
            <Quiet key={item.identifier}>
              {item.identifier}: {item.calibratedOn ? `calibrated ${formatDay(item.calibratedOn)}` : 'not calibrated'}
              {item.dueOn ? `, due ${formatDay(item.dueOn)}` : ''}
              {item.due === 'lapsed' ? <b className="text-madder">, lapsed</b> : null}
              {item.due === 'due-soon' ? <b className="text-ochre">, due soon</b> : null}
            </Quiet>
          ))}
        </Pair>
      ) : (
        <Pair name="Path">none, so no factor and no uncertainty</Pair>
      )}
      <Pair name="Limits">
        {limitSet.lines.map((line) => (
          <span key={line.id} className="block">
            {line.document}, revision {line.revision}
            <Quiet>
              {line.source}; {line.basis}
            </Quiet>
          </span>
        ))}
      </Pair>
      <Pair name="Uncertainty">
        {evaluation.uncertainty.length === 0
          ? 'not stated'
          : evaluation.uncertainty.map((step) => (
              <span key={step.startHz} className="block">
                {formatUncertainty(step.expandedDb)}, {formatFrequencyRange(step.startHz, step.stopHz)}
              </span>
            ))}
      </Pair>
      <Pair name="Decision rule">
        {RULE_NAMES[evaluation.decisionRule]}
        <Quiet>{RULE_SAYS[evaluation.decisionRule]}</Quiet>
      </Pair>
      <Pair name="Computed">
        {formatDayTime(evaluation.at, zone)} by {evaluation.engine}
      </Pair>
      {remarks.length > 0 ? (
        <Pair name="Remarks">
          {remarks.map((remark) => (
            <span key={remark} className="block">
              {remark}
            </span>
          ))}
        </Pair>
      ) : null}
    </dl>
  );
}

function Pair({ name, children }: { name: string; children: ReactNode }) {
  return (
    <>
      <dt>{name}</dt>
      <dd className="min-w-0 [overflow-wrap:anywhere]">{children}</dd>
    </>
  );
}

function Quiet({ children }: { children: ReactNode }) {
  return <span className="column-quiet block">{children}</span>;
}
