'use client';

import { useState } from 'react';
import { VerdictGlyph } from '@/components/ui/VerdictGlyph';
import { formatFrequency } from '@/format/frequencies';
import { formatMargin } from '@/format/quantities';
import { DETECTOR_MARKS, VERDICT_WORDS } from '@/format/words';
import type { EvaluationItem } from '@/schemas/runActs';
import type { CandidateView } from '@/schemas/sweep';

const SHOWN = 12;

/** What an evaluation that is no longer current listed, fetched when it is asked for. */
export function OldCandidates({ sweepId, evaluation }: { sweepId: string; evaluation: EvaluationItem }) {
  const [candidates, setCandidates] = useState<CandidateView[] | null>(null);
  const [wrong, setWrong] = useState(false);
  async function read() {
    const query = new URLSearchParams({ evaluation: evaluation.id, limit: String(SHOWN) });
    const response = await fetch(`/api/sweeps/${sweepId}/candidates?${query}`).catch(() => null);
    setWrong(!response?.ok);
    if (response?.ok) setCandidates(((await response.json()) as { items: CandidateView[] }).items);
  }
  if (evaluation.candidates === 0) return <>No candidates.</>;
  if (!candidates) {
    return (
      <>
        <button type="button" className="text-pen hover:underline" onClick={() => void read()}>
          Show its candidates
        </button>
        {wrong && <span className="block text-madder">They could not be read. Press again.</span>}
      </>
    );
  }
  const left = evaluation.candidates - candidates.length;
  return (
    <ol>
      {candidates.map((one) => (
        <li key={one.rank} className={`verdict-${one.verdict}`}>
          <VerdictGlyph verdict={one.verdict} />{' '}
          <span className="t-figure">
            {formatMargin(one.marginDb)}, {formatFrequency(one.frequencyHz)}
          </span>{' '}
          {DETECTOR_MARKS[one.detector]}, {VERDICT_WORDS[one.verdict]}
        </li>
      ))}
      {left > 0 && <li className="column-quiet">and {left} more</li>}
    </ol>
  );
}
