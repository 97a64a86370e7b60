'use client';

import { useId } from 'react';
import { ProblemMessage } from '@/components/forms/ProblemMessage';
import { usePreviewOf } from '@/components/forms/usePreviewOf';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { capitalised, DETECTOR_WORDS } from '@/format/words';
import { previewFinals, type FinalsPreview, type FinalsSheetView } from '@/schemas/finals';
import type { LineDetector } from '@/schemas/common';
import { FinalRow } from './FinalRow';
import { issuesOfRows, positionWords } from './finalsWords';
import type { PositionToKeep } from './useKeepFinals';
import type { Typed, TypedRow } from './typedFinals';

interface Props {
  of: FinalsSheetView['positions'][number];
  typed: Typed;
  /** What would be kept of it now; null while nothing can be. */
  asked: PositionToKeep | null;
  unit: string;
  radiated: boolean;
  /** What was refused of its rows, by row. */
  refused: Readonly<Record<string, string>>;
  onType: (key: string, row: TypedRow) => void;
}

const ORDER: readonly LineDetector[] = ['peak', 'quasi-peak', 'average'];

/** The emissions of one position, worst first, each with what it would be judged as. */
export function FinalsOfPosition({ of, typed, asked, unit, radiated, refused, onType }: Props) {
  const id = useId();
  const { position, finals } = of;
  const { reply, problem, current } = usePreviewOf<FinalsPreview>(previewFinals.path, asked && withoutTimes(asked));
  const detectors = ORDER.filter((one) => finals.some((final) => final.detectors.includes(one)));
  const wrong = { ...(problem && asked ? issuesOfRows(problem, asked.keys) : {}), ...refused };
  // The last answer is that of other rows until the next one is there.
  const judged = (key: string) => {
    const at = asked?.keys.indexOf(key) ?? -1;
    return at >= 0 && current ? (reply?.finals[at]?.readings ?? null) : null;
  };
  return (
    <section aria-labelledby={id} className="finals-position">
      <SectionHeading id={id} remark={finals.length === 1 ? '1 emission' : `${finals.length} emissions, worst first`}>
        {capitalised(positionWords(position))}
      </SectionHeading>
      <div className="finals-rows" data-levels={detectors.length} data-radiated={radiated}>
        <div className="finals-head" aria-hidden>
          <span>Asked</span>
          <span>Tuned to</span>
          {detectors.map((detector) => (
            <span key={detector}>{capitalised(DETECTOR_WORDS[detector])}</span>
          ))}
          {radiated && (
            <>
              <span>Height</span>
              <span>Azimuth</span>
            </>
          )}
          <span>Remark</span>
        </div>
        <ul aria-label={capitalised(positionWords(position))}>
          {finals.map((final) => (
            <FinalRow
              key={final.key}
              asked={final}
              typed={typed[final.key]}
              detectors={detectors}
              unit={unit}
              radiated={radiated}
              judged={judged(final.key)}
              refused={wrong[final.key] ?? null}
              onType={onType}
            />
          ))}
        </ul>
      </div>
      {problem && <ProblemMessage problem={problem} className="mt-3" />}
    </section>
  );
}

/** When a reading was typed changes no figure, so it asks for no new one. */
function withoutTimes({ body }: PositionToKeep) {
  return { ...body, finals: body.finals.map((final) => ({ ...final, readAt: null })) };
}
