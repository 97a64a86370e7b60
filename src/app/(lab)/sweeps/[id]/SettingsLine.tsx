import { VerdictGlyph } from '@/components/ui/VerdictGlyph';
import type { SweepView } from '@/schemas/sweep';
import { formatBandwidth } from '@/format/frequencies';
import { formatCount } from '@/format/quantities';

/** Limit set, step, RBW and points; a step wider than half the RBW is marked, since a narrow peak may read low. */
export function SettingsLine({ sweep }: { sweep: SweepView }) {
  const { stepHz, traces, points, limitSet } = sweep;
  const rbwHz = traces[0]?.rbwHz ?? null;
  const wide = stepHz !== null && rbwHz !== null && stepHz > rbwHz / 2;
  return (
    <>
      <span>{limitSet.name}</span>
      <span>
        {wide ? (
          <span className="text-ochre" title="A narrow peak may read low">
            <VerdictGlyph verdict="inconclusive" />{' '}
            <b>
              step <span className="t-figure">{formatBandwidth(stepHz)}</span>
            </b>
            ,{' '}
          </span>
        ) : stepHz !== null ? (
          <>
            step <span className="t-figure">{formatBandwidth(stepHz)}</span>,{' '}
          </>
        ) : null}
        {rbwHz === null ? (
          'RBW not stated'
        ) : (
          <>
            RBW <span className="t-figure">{formatBandwidth(rbwHz)}</span>
          </>
        )}
        , <span className="t-figure">{formatCount(points)}</span> points
      </span>
    </>
  );
}
