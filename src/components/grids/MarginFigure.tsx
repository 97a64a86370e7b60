'use client';

import { ComputedFigure } from '@/components/ui/Figure';
import { formatDb, marginText } from '@/format/quantities';
import type { CandidateView } from '@/schemas/sweep';
import type { CandidateFigures } from './candidateColumns';

/** A margin with its word behind it, so that figures stand under one another. */
export function MarginFigure({ candidate, open, onFigure }: { candidate: CandidateView } & CandidateFigures) {
  const { figure, word } = marginText(candidate.marginDb);
  return (
    <span className="inline-flex items-baseline justify-end whitespace-nowrap">
      <ComputedFigure
        strong
        value={figure}
        quantity="margin"
        saidUnit={`dB ${word}`}
        open={open?.rank === candidate.rank && open.figure === 'margin'}
        onOpen={() => onFigure(candidate, 'margin')}
      />
      <span aria-hidden className="min-w-[3.25em] pl-[0.4em] text-left">
        {word}
      </span>
    </span>
  );
}

export function LevelFigure({
  candidate,
  unit,
  open,
  onFigure,
}: { candidate: CandidateView; unit: string } & CandidateFigures) {
  return (
    <ComputedFigure
      value={formatDb(candidate.level)}
      quantity="level"
      saidUnit={unit}
      open={open?.rank === candidate.rank && open.figure === 'level'}
      onOpen={() => onFigure(candidate, 'level')}
    />
  );
}
